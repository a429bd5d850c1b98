import type { FairCopy, GroupView, NotebookView, RecordView } from '@stillroom/shared/contracts';
import type { BrowserContext, Page } from 'playwright-core';
import { beforeAll, describe, expect, test, vi } from 'vitest';
import { demoPassword } from '../../packages/server/src/demo/people.ts';
import { violationsInBothThemes } from '../support/axe.ts';
import { patience } from '../support/browsing.ts';
import { buildGroup, buildPerson } from '../support/build.ts';
import { useDemo } from '../support/demo-browsing.ts';
import { buildNotebook, cell } from '../support/live.ts';

/**
 * Every page and every state that matters, in both themes, under the rules of WCAG 2.2 A and AA as axe knows them. The
 * pages are those of the demo, which uses all kinds of cells; what the demo does not show is built.
 */
const demo = useDemo();
const { as, ask, send, groupNamed, letterLink } = demo;
let page: Page;
let context: BrowserContext;
beforeAll(() => {
  ({ page, context } = demo);
});

/** Opens an address, waits for words that only the finished page shows, and lets axe look. */
async function look(path: string, words: string | RegExp): Promise<void> {
  await page.goto(path);
  await page.getByText(words).first().waitFor(patience);
  expect(await violationsInBothThemes(page)).toEqual([]);
}

/** Waits until every cell of a notebook has come to rest. */
async function atRest(notebook: string): Promise<void> {
  await vi.waitFor(
    async () => {
      const { cells } = await ask<FairCopy>(`/api/notebooks/${notebook}/fair-copy`);
      expect(cells.filter(({ state }) => state === 'working')).toEqual([]);
    },
    { timeout: 60_000, interval: 250 },
  );
}

/** Walks down an open notebook so that every cell is made, then looks at the whole. */
async function lookThrough(): Promise<void> {
  const cells = await page.locator('.cell').count();
  for (let i = 0; i < cells; i++) await page.locator('.cell').nth(i).scrollIntoViewIfNeeded();
  await page.evaluate(() => scrollTo(0, 0));
  expect(await violationsInBothThemes(page)).toEqual([]);
}

describe('pages that need no account', { timeout: 120_000 }, () => {
  test('sign-in', () => look('/sign-in', 'Sign in'));
  test('sign-in, refused', async () => {
    await page.goto('/sign-in');
    await page.getByLabel('Email').fill('nobody@example.org');
    await page.locator('#password').fill('not the password');
    await page.getByRole('button', { name: 'Sign in', exact: true }).click();
    await page.getByRole('alert').first().waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
  });
  test('sign-up', () => look('/sign-up', /account|invitation/iu));
  test('new password, asked for', () => look('/new-password', 'Send me a link'));
  test('new password, set', () =>
    look('/new-password/AAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAA', 'Set it'));
  test('help on the notation', () => look('/help/notation', /Help on the notation/u));
  test('an address where nothing stands', () => look('/nothing/here', 'Nothing stands at this address'));
});

describe('pages of a lead', { timeout: 120_000 }, () => {
  let group: GroupView;
  beforeAll(async () => {
    await as('ilse');
    group = await groupNamed('Brewhouse Kinetics');
  }, 60_000);

  test('the Shelf', () => look('/', 'Diacetyl rest'));
  test('the Shelf, nothing found', async () => {
    await page.goto('/');
    await page.getByLabel('Find').fill('no notebook has these words');
    await page.getByText('No notebook here answers to that.').waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
  });
  test('a new notebook, asked for', async () => {
    await page.goto('/');
    await page.getByRole('button', { name: 'New notebook' }).click();
    await page.getByRole('button', { name: 'Begin it' }).waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
  });
  test('the account menu, open', async () => {
    await page.goto('/account');
    await page.getByRole('button', { name: /Ilse Marrowby/u }).click();
    await page.getByRole('menuitem').first().waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
  });
  test('groups', () => look('/groups', 'Brewhouse Kinetics'));
  test('a group, with an invitation being written and one under way', async () => {
    await page.goto(`/groups/${group.id}`);
    await page.getByRole('button', { name: 'Invite someone…' }).click();
    const panel = page.getByRole('region', { name: /Invite someone to/u });
    await panel.getByLabel('Email').fill('guest@example.org');
    await panel.getByRole('button', { name: 'Send the invitation' }).click();
    await panel.getByText('is on its way').waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
  });
  test('account', () => look('/account', 'Where you are signed in'));
  test('records', () => look('/records', 'Diacetyl rest'));
  test('a record, its authors’ side', () => look(`/records/${group.records[0]?.id}`, 'Diacetyl rest'));
  test('a record, while a reviewer is invited', async () => {
    await page.goto(`/records/${group.records[0]?.id}`);
    await page.getByRole('button', { name: 'Invite a reviewer…' }).click();
    await page.getByLabel('Email').waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
  });
});

describe('an open notebook', { timeout: 180_000 }, () => {
  let notebooks: Readonly<Record<string, string>>;
  beforeAll(async () => {
    await as('ilse');
    const named = await Promise.all(
      ['Brewhouse Kinetics', 'Ring and Chain', 'Tidewater Epidemics'].map(groupNamed),
    );
    notebooks = Object.fromEntries(named.map((group) => [group.name, group.notebooks[0]?.id ?? '']));
    for (const id of Object.values(notebooks)) await atRest(id);
  }, 120_000);

  test.each(['Brewhouse Kinetics', 'Ring and Chain', 'Tidewater Epidemics'])(
    'the Spread of %s, every cell made',
    async (group) => {
      await page.goto(`/notebooks/${notebooks[group]}`);
      await page.locator('.cell').first().waitFor(patience);
      await lookThrough();
    },
  );
  test('a selected cell of each kind, with its Workings and actions', async () => {
    for (const group of ['Brewhouse Kinetics', 'Ring and Chain']) {
      await page.goto(`/notebooks/${notebooks[group]}`);
      for (const kind of [
        'prose',
        'network',
        'structure',
        'balance',
        'script',
        'plot',
        'claim',
        'trajectory',
      ]) {
        const one = page.locator(`.cell.kind-${kind}`).first();
        await page.locator('.cell').first().waitFor(patience);
        if ((await one.count()) === 0) continue;
        await one.locator('.seam button[id^="slip-"]').click();
        await one.locator('.seam [aria-pressed="true"]').waitFor(patience);
        expect([kind, await violationsInBothThemes(page, '.cell.selected')]).toEqual([kind, []]);
      }
    }
  });
  test('prose, while it is written', async () => {
    await page.goto(`/notebooks/${notebooks['Brewhouse Kinetics']}`);
    await page.locator('.cell.kind-prose .seam button').first().click();
    await page.keyboard.press('F2');
    await page.locator('.cell.kind-prose .cm-content:focus').waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
  });
  test('the list of keys', async () => {
    await page.goto(`/notebooks/${notebooks['Brewhouse Kinetics']}`);
    await page.locator('.cell').first().waitFor(patience);
    await page.keyboard.press('F1');
    await page.getByRole('complementary', { name: 'Keys' }).waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
  });
  test('reading', async () => {
    await look(`/notebooks/${notebooks['Brewhouse Kinetics']}?view=reading`, 'The question');
    await lookThrough();
  });
  test('the plan, drawn and as an outline', async () => {
    await look(`/notebooks/${notebooks['Brewhouse Kinetics']}/plan`, 'Plan of the notebook');
    await page.getByRole('button', { name: 'Outline' }).click();
    expect(await violationsInBothThemes(page)).toEqual([]);
  });
  test('freezing', () => look(`/notebooks/${notebooks['Brewhouse Kinetics']}/freeze`, /settled/u));
  test('its public copy', async () => {
    const id = notebooks['Tidewater Epidemics'];
    const group = await groupNamed('Tidewater Epidemics');
    await demo.enter('rurik@tidewater.example', demoPassword);
    expect(group.notebooks[0]?.id).toBe(id);
    await send(`/api/notebooks/${id}/public`, 'put', { public: true });
    const { publicLink } = await ask<NotebookView>(`/api/notebooks/${id}`);
    await context.clearCookies();
    await look(new URL(publicLink ?? '').pathname, 'Norovirus aboard a ferry');
    await lookThrough();
  });
  test.each([
    ['a tablet', 1024],
    ['a small tablet', 768],
    ['a phone', 390],
  ])('the Spread on %s, either page', async (_words, width) => {
    await as('ilse');
    await page.setViewportSize({ width, height: 844 });
    await page.goto(`/notebooks/${notebooks['Brewhouse Kinetics']}`);
    await page.locator('.cell').first().waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
    await page.getByRole('button', { name: 'Workings', exact: true }).first().click();
    expect(await violationsInBothThemes(page)).toEqual([]);
    await page.setViewportSize({ width: 1440, height: 900 });
  });
});

describe('a person with a notebook of their own', { timeout: 120_000 }, () => {
  let notebook: string;
  let fresh: string;
  beforeAll(async () => {
    const person = await buildPerson(demo.server, { email: 'pell@example.org', name: 'Pell Arden' });
    await demo.enter('pell@example.org');
    const group = await buildGroup(demo.server, person, 'Pell and others');
    fresh = await buildNotebook(demo.server, group, person);
    notebook = await buildNotebook(demo.server, group, person, [
      cell('yeast', 'network', 'A <=> B | 2 /s, 1 /s\nstart A = 3 M'),
      cell('broken', 'network', 'A --> B\nC -> D | 1 /z'),
      cell('shape', 'structure', '', { settings: { network: 'broken' } }),
      cell('kept', 'claim', 'yeast.counts.species == 2', {
        held: { by: person.id, at: '2026-11-30T09:00:00.000Z' },
      }),
      cell('wrong', 'claim', '1 > 2'),
    ]);
  }, 120_000);

  test('the Shelf, empty, and with cells that fail', async () => {
    await buildPerson(demo.server, { email: 'new@example.org', name: 'New Comer' });
    await demo.enter('new@example.org');
    await look('/', 'No notebook stands here yet.');
    await demo.enter('pell@example.org');
    await look('/', 'Diacetyl rest');
  });
  test('first run', () => look(`/notebooks/${fresh}`, /outline/iu));
  test('cells that failed, are stale, are held', async () => {
    await page.goto(`/notebooks/${notebook}`);
    await page.locator('.cell.st-failed').first().waitFor(patience);
    await page.locator('.cell.st-held').first().waitFor(patience);
    await page.locator('.cell.st-stale, .cell.st-failed.kind-structure').first().waitFor(patience);
    await page.locator('.say').first().waitFor(patience);
    await lookThrough();
  });
  test('a line that is down', async () => {
    await page.goto(`/notebooks/${notebook}`);
    await page.locator('.cell').first().waitFor(patience);
    await context.setOffline(true);
    await page.getByText('The line to the server is down').waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
    await context.setOffline(false);
  });
  test('a notebook that is not open to this person', async () => {
    await as('nadia');
    await look(`/notebooks/${notebook}`, 'No such notebook is open to you');
  });
});

describe('links from letters, and the operator', { timeout: 180_000 }, () => {
  test('an invitation', async () => {
    await as('ilse');
    const { id } = await groupNamed('Brewhouse Kinetics');
    const invitation = { email: 'other@example.org', role: 'author', notebooks: null, message: 'Join us.' };
    await send(`/api/groups/${id}/invitations`, 'post', invitation);
    await context.clearCookies();
    await look(await letterLink('invitation', 'other@example.org'), 'Brewhouse Kinetics');
  });
  test('the review desk, before and after a rerun', async () => {
    const link = await letterLink('review', 'tobias@quenell.example');
    await look(link, 'Yours alone');
    await page.getByRole('button', { name: 'Rerun every cell' }).click();
    await expect
      .poll(() => page.locator('.contents .summary').innerText(), { timeout: 120_000 })
      .toMatch(/^\d+ match$/u);
    expect(await violationsInBothThemes(page)).toEqual([]);
  });
  test('a review link that opens nothing', () =>
    look('/review/AAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAA', 'This link does not open a record'));
  test('the public copy of a record', async () => {
    await as('ilse');
    const group = await groupNamed('Brewhouse Kinetics');
    const answer = await send(`/api/records/${group.records[0]?.id}/public`, 'put', { public: true });
    const { publicLink } = (await answer.json()) as Pick<RecordView, 'publicLink'>;
    await context.clearCookies();
    await look(new URL(publicLink ?? '', demo.server.url).pathname, 'Diacetyl rest');
  });
  test('the operator’s room', async () => {
    await as('orla');
    await look('/operator', /queue/iu);
  });
});
