import type { NotebookView } from '@stillroom/shared/contracts';
import type { BrowserContext, Page } from 'playwright-core';
import { beforeAll, describe, expect, test } from 'vitest';
import { violationsInBothThemes } from '../support/axe.ts';
import { patience } from '../support/browsing.ts';
import { buildGroup, buildPerson } from '../support/build.ts';
import { useDemo } from '../support/demo-browsing.ts';
import { buildNotebook, cell } from '../support/live.ts';

/**
 * The states that a page passes through, refused, empty, loading, asked, in both themes, under the rules of WCAG 2.2 A and
 * AA as axe knows them. The pages at rest are in accessibility.test.ts.
 */
const nowhere = 'A'.repeat(43);
const demo = useDemo();
const { as, ask, send, groupNamed, letterLink } = demo;
let page: Page;
let context: BrowserContext;
beforeAll(() => {
  ({ page, context } = demo);
});

const brewhouse = () => groupNamed('Brewhouse Kinetics');

/** Waits for words that only this state shows, and lets axe look. */
async function look(words: string | RegExp): Promise<void> {
  await page.getByText(words).first().waitFor(patience);
  expect(await violationsInBothThemes(page)).toEqual([]);
}

describe('doors', { timeout: 90_000 }, () => {
  test('sign-up, open, then sent', async () => {
    await as('orla');
    await send('/api/operator/settings', 'patch', { signUp: 'open' });
    await context.clearCookies();
    await page.goto('/sign-up');
    await look('Several hands, one book');
    await page.getByLabel('Email').fill('somebody@example.org');
    await page.getByLabel(/Your name/u).fill('Some Body');
    await page.locator('#password').fill('long enough, this one');
    await page.getByRole('button', { name: 'Sign up', exact: true }).click();
    await look('A letter is on its way');
  });
  test('an address confirmed, and a link that confirms nothing', async () => {
    await page.goto(await letterLink('confirm', 'somebody@example.org'));
    await look('Welcome, Some Body');
    await context.clearCookies();
    await page.goto(`/confirm/${nowhere}`);
    await look('Confirmed already?');
  });
  test('a new password, on its way', async () => {
    await page.goto('/new-password');
    await page.getByLabel('Email').fill('somebody@example.org');
    await page.getByRole('button', { name: 'Send me a link' }).click();
    await look('is on its way');
  });
  test('an invitation for somebody known, for somebody else, and one that opens nothing', async () => {
    await as('ilse');
    const invitation = { email: 'somebody@example.org', role: 'reader', notebooks: null, message: '' };
    await send(`/api/groups/${(await brewhouse()).id}/invitations`, 'post', invitation);
    const link = await letterLink('invitation', 'somebody@example.org');
    await page.goto(link);
    await look('You are signed in as');
    await context.clearCookies();
    await page.goto(link);
    await look('has an account here');
    await page.goto(`/invitation/${nowhere}`);
    await look('This invitation opens nothing');
  });
  test('links to copies that are closed', async () => {
    await page.goto(`/read/${nowhere}`);
    await look('opens nothing any more');
    await page.goto(`/read-record/${nowhere}`);
    await look('does not open a record');
  });
});

describe('rooms', { timeout: 90_000 }, () => {
  test('the Shelf, not answered and not reached', async () => {
    await as('ilse');
    await page.route('**/api/shelf', () => undefined);
    await page.goto('/');
    await look('Taking the notebooks down…');
    await page.unroute('**/api/shelf');
    await page.route('**/api/shelf', (route) => route.abort());
    await page.goto('/');
    await look('The server does not answer');
    await page.unroute('**/api/shelf');
  });
  test('a first notebook, where there is no group yet', async () => {
    await buildPerson(demo.server, { email: 'first@example.org', name: 'First Comer' });
    await demo.enter('first@example.org');
    await page.goto('/');
    await page.getByRole('button', { name: 'Begin one' }).click();
    await look('A notebook belongs to a group');
    await page.goto('/groups');
    await look('You are in no group yet');
    await page.goto('/records');
    await look('Nothing has been frozen yet');
  });
  test('the bin, opened', async () => {
    const person = await buildPerson(demo.server, { email: 'bin@example.org', name: 'Bin Owner' });
    await demo.enter('bin@example.org');
    const id = await buildNotebook(demo.server, await buildGroup(demo.server, person), person);
    await context.request.delete(`/api/notebooks/${id}`, { headers: { origin: demo.server.url } });
    await page.goto('/');
    await page.getByText(/In the bin/u).click();
    await look('Put it back');
  });
  test('a group that is not open, and the operator’s room to others', async () => {
    await as('ilse');
    const { id } = await brewhouse();
    await demo.enter('first@example.org');
    await page.goto(`/groups/${id}`);
    await look('This group is not open to you');
    await page.goto('/operator');
    await look('Only the operator');
  });
  test('handing a group over, and taking somebody out of it', async () => {
    await as('ilse');
    await page.goto(`/groups/${(await brewhouse()).id}`);
    await page.getByRole('button', { name: 'Hand over…' }).click();
    await look('Someone else becomes lead');
    await page.getByRole('button', { name: 'Leave it' }).click();
    await page.getByRole('dialog').waitFor({ state: 'detached' });
    await page.getByRole('button', { name: 'Remove Dov Hartrigg' }).click();
    await look('they can no longer open it');
  });
  test('the account, refused', async () => {
    await page.goto('/account');
    await page.locator('#current').fill('not my password');
    await page.locator('#next').fill('short');
    await page.getByRole('button', { name: 'Change it' }).click();
    await look('at least 10 characters.');
  });
});

describe('notebooks and records', { timeout: 120_000 }, () => {
  let notebook: string;
  let record: string;
  beforeAll(async () => {
    await as('ilse');
    const group = await brewhouse();
    notebook = group.notebooks[0]?.id ?? '';
    record = group.records[0]?.id ?? '';
  });

  async function open(): Promise<void> {
    await page.goto(`/notebooks/${notebook}`);
    await page.locator('.cell').first().waitFor(patience);
  }

  test('a remark being written, and a cell folded', async () => {
    await open();
    await page.locator('.cell.kind-network .seam button[id^="slip-"]').first().click();
    await page.getByRole('button', { name: 'Remark', exact: true }).first().click();
    await page.getByLabel('Your remark').waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
    await page.locator('.cell.selected').getByRole('button', { name: 'Fold', exact: true }).click();
    await look('Unfold');
    await page.evaluate(() => localStorage.clear());
  });
  test('the Contents, opened over one page', async () => {
    await page.setViewportSize({ width: 768, height: 900 });
    await open();
    await page
      .getByRole('button', { name: /Contents/u })
      .first()
      .click();
    await page.getByRole('button', { name: 'Close' }).first().waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
    await page.setViewportSize({ width: 1440, height: 900 });
  });
  test('the plan, a cell chosen, and on a phone', async () => {
    await page.goto(`/notebooks/${notebook}/plan`);
    await page.getByRole('button', { name: 'Outline' }).click();
    await page.getByRole('button', { name: 'fates', exact: true }).click();
    await look('If it changes');
    await page.setViewportSize({ width: 390, height: 844 });
    await page.goto(`/notebooks/${notebook}/plan`);
    await page.getByRole('button', { name: 'fates', exact: true }).waitFor(patience);
    expect(await violationsInBothThemes(page)).toEqual([]);
    await page.setViewportSize({ width: 1440, height: 900 });
  });
  test('freezing, stopped by cells that failed', async () => {
    const person = await buildPerson(demo.server, { email: 'stop@example.org', name: 'Stopped Short' });
    await demo.enter('stop@example.org');
    const id = await buildNotebook(demo.server, await buildGroup(demo.server, person, 'Stopped'), person, [
      cell('broken', 'network', 'A --> B'),
      cell('wrong', 'claim', '1 > 2'),
    ]);
    await page.goto(`/notebooks/${id}`);
    await page.locator('.cell').first().waitFor(patience);
    await page.goto(`/notebooks/${id}/freeze`);
    await look(/not current/u);
    await as('ilse');
    expect((await ask<NotebookView>(`/api/notebooks/${notebook}`)).id).toBe(notebook);
  });
  test('a record just frozen, to its last leaf, opened to anyone', async () => {
    await page.goto(`/records/${record}?frozen=now`);
    await page.getByText('nothing you do there touches the record').waitFor(patience);
    await page.getByRole('button', { name: 'Open it to anyone with a link' }).click();
    await page.getByText('Open to anyone with').waitFor(patience);
    await page.getByText('What this record holds').scrollIntoViewIfNeeded();
    await look('What this record holds');
  });
  test('a record that is not open to this person', async () => {
    await buildPerson(demo.server, { email: 'stranger@example.org', name: 'Stranger Here' });
    await demo.enter('stranger@example.org');
    await page.goto(`/records/${record}`);
    await look('This record is not open to you');
  });
  test('the review desk while a remark is written and the verdict is about to go', async () => {
    await page.goto(await letterLink('review', 'tobias@quenell.example'));
    await page.getByRole('button', { name: 'Write a remark' }).first().click();
    await page.getByText(/Remark on/u).waitFor(patience);
    await page.getByText('Take it when these points are met').click();
    await page.getByRole('button', { name: 'Send the verdict…' }).click();
    await look('It cannot be changed afterwards');
  });
});
