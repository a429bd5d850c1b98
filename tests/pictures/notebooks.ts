import type { GroupView } from '@stillroom/shared/contracts';
import type { GroupRole } from '@stillroom/shared/roles';
import type { Page } from 'playwright-core';
import type { Stage, Who } from './stage.ts';
import type { Station } from './stations.ts';

/** Opens a notebook at its first cell, every cell made. */
async function open(page: Page, stage: Stage, who: Who, title = 'Diacetyl rest', query = ''): Promise<void> {
  await page.goto(`/notebooks/${await stage.notebookNamed(who, title)}${query}`);
  await page.locator('.cell, .leaf .fc').first().waitFor({ timeout: 60_000 });
  await walkDown(page);
}

/** Results come as their cell nears the window. */
export async function walkDown(page: Page): Promise<void> {
  const cells = page.locator('.cell, .leaf .fc');
  for (let i = 0; i < (await cells.count()); i++) await cells.nth(i).scrollIntoViewIfNeeded();
  await page.evaluate(() => scrollTo(0, 0));
}

/** A notebook of the newcomer's own with a cell in each sad state. */
async function troubled(stage: Stage): Promise<string> {
  const group = await ownGroup(stage);
  return stage.bringIn('newcomer', group, 'Cells in trouble', [
    { kind: 'network', name: 'yeast', text: 'A <=> B | 2 /s, 1 /s\nstart A = 3 M' },
    { kind: 'network', name: 'broken', text: 'A --> B\nC -> D | 1 /z' },
    { kind: 'structure', name: 'shape', settings: { network: 'broken' } },
    { kind: 'claim', name: 'kept', text: 'yeast.counts.species == 2', held: true },
    { kind: 'claim', name: 'wrong', text: '1 > 2' },
  ]);
}

async function ownGroup(stage: Stage): Promise<string> {
  const groups = await stage.ask<readonly { id: string }[]>('newcomer', '/api/groups');
  if (groups[0] !== undefined) return groups[0].id;
  const made = await stage.send<{ id: string }>('newcomer', 'POST', '/api/groups', {
    name: 'Arden and others',
  });
  return made.id;
}

export const notebooks: readonly Station[] = [
  {
    name: 'first-run',
    who: 'newcomer',
    show: async (page, stage) => {
      const group = await ownGroup(stage);
      const { id } = await stage.send<{ id: string }>('newcomer', 'POST', `/api/groups/${group}/notebooks`, {
        title: 'A first notebook',
      });
      await page.goto(`/notebooks/${id}`);
      await page
        .getByText(/outline/u)
        .first()
        .waitFor();
    },
  },
  {
    name: 'notebook-opening',
    who: 'ilse',
    show: async (page, stage) => {
      await page.routeWebSocket(/\/live\//u, () => undefined);
      await page.goto(`/notebooks/${await stage.notebookNamed('ilse', 'Norovirus')}`);
      await page.getByText('Opening the notebook…').waitFor();
      return () => stage.forget('ilse');
    },
  },
  { name: 'spread', who: 'ilse', show: (page, stage) => open(page, stage, 'ilse') },
  { name: 'spread-ring', who: 'ilse', show: (page, stage) => open(page, stage, 'ilse', 'Beads') },
  { name: 'spread-remarker', who: 'rurik', show: (page, stage) => open(page, stage, 'rurik') },
  { name: 'spread-reader', who: 'tamsin', show: (page, stage) => open(page, stage, 'tamsin') },
  {
    name: 'spread-selected',
    who: 'ilse',
    show: async (page, stage) => {
      await open(page, stage, 'ilse');
      await page.locator('.cell.kind-structure .seam button[id^="slip-"]').first().click();
      await page.locator('.seam [aria-pressed="true"]').waitFor();
    },
  },
  {
    name: 'spread-writing',
    who: 'ilse',
    show: async (page, stage) => {
      await open(page, stage, 'ilse');
      await page.locator('.cell.kind-network .seam button[id^="slip-"]').first().click();
      await page.keyboard.press('F2');
      await page.locator('.cell.kind-network .cm-content:focus').waitFor();
    },
  },
  {
    name: 'spread-remarking',
    who: 'ilse',
    show: async (page, stage) => {
      await open(page, stage, 'ilse');
      await page.locator('.cell.kind-network .seam button[id^="slip-"]').first().click();
      await page.getByRole('button', { name: 'Remark', exact: true }).first().click();
      await page.getByLabel('Your remark').waitFor();
    },
  },
  {
    name: 'spread-folded',
    who: 'ilse',
    show: async (page, stage) => {
      await open(page, stage, 'ilse');
      for (const kind of ['network', 'structure']) {
        await page.locator(`.cell.kind-${kind} .seam button[id^="slip-"]`).first().click();
        await page.locator('.cell.selected').getByRole('button', { name: 'Fold', exact: true }).click();
      }
      return async () => {
        await page.evaluate(() => localStorage.clear());
      };
    },
  },
  {
    name: 'spread-keys',
    who: 'ilse',
    show: async (page, stage) => {
      await open(page, stage, 'ilse');
      await page.keyboard.press('F1');
      await page.getByRole('complementary', { name: 'Keys' }).waitFor();
    },
  },
  {
    name: 'spread-contents-panel',
    who: 'ilse',
    show: async (page, stage) => {
      await page.setViewportSize({ width: 768, height: 900 });
      await open(page, stage, 'ilse');
      await page
        .getByRole('button', { name: /Contents/u })
        .first()
        .click();
    },
  },
  {
    name: 'spread-workings-page',
    who: 'ilse',
    show: async (page, stage) => {
      await page.setViewportSize({ width: 768, height: 900 });
      await open(page, stage, 'ilse');
      await page.getByRole('button', { name: 'Workings', exact: true }).first().click();
      return async () => {
        await page.setViewportSize({ width: 768, height: 900 });
        await page.getByRole('button', { name: 'Fair copy', exact: true }).first().click();
      };
    },
  },
  {
    name: 'spread-line-down',
    who: 'dov',
    show: async (page, stage) => {
      await open(page, stage, 'dov');
      await page.context().setOffline(true);
      await page.getByText('The line to the server is down').waitFor();
      return () => page.context().setOffline(false);
    },
  },
  {
    name: 'spread-set-aside',
    who: 'dov',
    show: async (page, stage) => {
      const group = await stage.groupNamed('ilse', 'Brewhouse Kinetics');
      const { members } = await stage.ask<GroupView>('ilse', `/api/groups/${group}`);
      const dov = members.find(({ name }) => name.startsWith('Dov'))?.id ?? '';
      const make = (role: GroupRole) =>
        stage.send('ilse', 'PATCH', `/api/groups/${group}/members/${dov}`, { role, notebooks: null });
      await open(page, stage, 'dov');
      await page.context().setOffline(true);
      await page.getByText('The line to the server is down').waitFor();
      await page.locator('.cell.kind-network .cm-content').first().click();
      await page.keyboard.press('Control+End');
      await page.keyboard.type('\nD -> A | back = 0.001 /s | a thought on the train');
      await make('reader');
      try {
        await page.context().setOffline(false);
        await page.getByText('The line to the server is down').waitFor({ state: 'detached' });
        await page.keyboard.type('s');
        await page.getByText('Your last changes were not taken in').waitFor();
      } finally {
        await make('author');
      }
    },
  },
  {
    name: 'spread-troubled',
    who: 'newcomer',
    show: async (page, stage) => {
      await page.goto(`/notebooks/${await troubled(stage)}`);
      await page.locator('.cell.st-failed').first().waitFor();
      await walkDown(page);
    },
  },
  {
    name: 'notebook-forbidden',
    who: 'newcomer',
    show: async (page, stage) => {
      await page.goto(`/notebooks/${await stage.notebookNamed('ilse', 'Diacetyl rest')}`);
      await page.getByText('No such notebook').waitFor();
    },
  },
  {
    name: 'reading',
    who: 'ilse',
    show: (page, stage) => open(page, stage, 'ilse', 'Diacetyl rest', '?view=reading'),
  },
  {
    name: 'reading-reader',
    who: 'tamsin',
    show: (page, stage) => open(page, stage, 'tamsin', 'Diacetyl rest', '?view=reading'),
  },
  {
    name: 'reading-caution',
    who: 'rurik',
    show: (page, stage) => open(page, stage, 'rurik', 'Norovirus', '?view=reading'),
  },
  {
    name: 'plan',
    who: 'ilse',
    show: async (page, stage) => {
      await page.goto(`/notebooks/${await stage.notebookNamed('ilse', 'Diacetyl rest')}/plan`);
      await page.locator('.pn svg, .pn button').first().waitFor();
    },
  },
  {
    name: 'plan-selected',
    who: 'ilse',
    show: async (page, stage) => {
      await page.goto(`/notebooks/${await stage.notebookNamed('ilse', 'Diacetyl rest')}/plan`);
      await page.getByText('fates', { exact: true }).first().click();
    },
  },
  {
    name: 'plan-outline',
    who: 'ilse',
    show: async (page, stage) => {
      await page.goto(`/notebooks/${await stage.notebookNamed('ilse', 'Diacetyl rest')}/plan`);
      await page.getByRole('button', { name: 'Outline' }).click();
    },
  },
  {
    name: 'public-copy',
    who: 'nobody',
    show: async (page, stage) => {
      const id = await stage.notebookNamed('rurik', 'Norovirus');
      const { publicLink } = await stage.send<{ publicLink: string }>(
        'rurik',
        'PUT',
        `/api/notebooks/${id}/public`,
        {
          public: true,
        },
      );
      await page.goto(new URL(publicLink).pathname);
      await page
        .getByRole('heading', { name: /Norovirus/u })
        .first()
        .waitFor();
      await walkDown(page);
    },
  },
  {
    name: 'public-copy-closed',
    who: 'nobody',
    show: async (page) => {
      await page.goto(`/read/${'A'.repeat(43)}`);
      await page.getByText('opens nothing any more').waitFor();
    },
  },
  {
    name: 'print-reading',
    who: 'ilse',
    print: true,
    show: (page, stage) => open(page, stage, 'ilse', 'Diacetyl rest', '?view=reading'),
  },
  { name: 'print-spread', who: 'ilse', print: true, show: (page, stage) => open(page, stage, 'ilse') },
];
