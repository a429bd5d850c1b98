import type { SessionView } from '@stillroom/shared/contracts';
import type { Page } from 'playwright-core';
import { walkDown } from './notebooks.ts';
import type { Stage } from './stage.ts';
import type { Station } from './stations.ts';

async function demoRecord(stage: Stage): Promise<string> {
  const group = await stage.groupNamed('ilse', 'Brewhouse Kinetics');
  const { records } = await stage.ask<{ records: readonly { id: string }[] }>('ilse', `/api/groups/${group}`);
  return records.at(-1)?.id ?? '';
}

async function openRecord(page: Page, path: string): Promise<void> {
  await page.goto(path);
  await page.locator('.cell').first().waitFor({ timeout: 60_000 });
  await walkDown(page);
}

async function desk(stage: Stage): Promise<string> {
  return (await stage.ask<SessionView>('nobody', '/api/session')).demoReview ?? '';
}

/** Freezing, records and their review. */
export const records: readonly Station[] = [
  {
    name: 'freeze',
    who: 'ilse',
    show: async (page, stage) => {
      await page.goto(`/notebooks/${await stage.notebookNamed('ilse', 'Diacetyl rest')}/freeze`);
      await page
        .getByText(/settled/u)
        .first()
        .waitFor();
    },
  },
  {
    name: 'freeze-stopped',
    who: 'newcomer',
    show: async (page, stage) => {
      await page.goto(`/notebooks/${await stage.notebookNamed('newcomer', 'Cells in trouble')}/freeze`);
      await page
        .getByText(/not current/u)
        .first()
        .waitFor();
    },
  },
  {
    name: 'record',
    who: 'ilse',
    show: async (page, stage) => openRecord(page, `/records/${await demoRecord(stage)}`),
  },
  {
    name: 'record-frozen-now',
    who: 'ilse',
    show: async (page, stage) => openRecord(page, `/records/${await demoRecord(stage)}?frozen=now`),
  },
  {
    name: 'record-inviting',
    who: 'ilse',
    show: async (page, stage) => {
      await openRecord(page, `/records/${await demoRecord(stage)}`);
      await page.getByRole('button', { name: 'Invite a reviewer…' }).click();
    },
  },
  {
    name: 'record-reader',
    who: 'tamsin',
    show: async (page, stage) => openRecord(page, `/records/${await demoRecord(stage)}`),
  },
  {
    name: 'record-forbidden',
    who: 'newcomer',
    show: async (page, stage) => {
      await page.goto(`/records/${await demoRecord(stage)}`);
      await page.getByRole('alert').waitFor();
    },
  },
  {
    name: 'record-public',
    who: 'nobody',
    show: async (page, stage) => {
      const id = await demoRecord(stage);
      const { publicLink } = await stage.send<{ publicLink: string }>(
        'ilse',
        'PUT',
        `/api/records/${id}/public`,
        {
          public: true,
        },
      );
      await openRecord(page, publicLink);
    },
  },
  { name: 'review', who: 'nobody', show: async (page, stage) => openRecord(page, await desk(stage)) },
  {
    name: 'review-rerun',
    who: 'nobody',
    show: async (page, stage) => {
      await openRecord(page, await desk(stage));
      await page.getByRole('button', { name: 'Rerun every cell' }).click();
      await page.waitForFunction(
        () =>
          !/working|not rerun/u.test(document.querySelector('.contents .summary')?.textContent ?? 'working'),
        undefined,
        { timeout: 120_000 },
      );
      await walkDown(page);
    },
  },
  {
    name: 'review-lost',
    who: 'nobody',
    show: async (page) => {
      await page.goto(`/review/${'A'.repeat(43)}`);
      await page.getByText('does not open a record').waitFor();
    },
  },
  {
    name: 'print-record',
    who: 'ilse',
    print: true,
    show: async (page, stage) => openRecord(page, `/records/${await demoRecord(stage)}`),
  },
];
