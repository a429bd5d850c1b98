import type { Page } from 'playwright-core';
import { beforeAll, describe, expect, test } from 'vitest';
import { cellNamed, patience, useBrowsing } from '../support/browsing.ts';
import { buildGroup, buildPerson, usualPassword } from '../support/build.ts';
import { focusOn, pressUntil } from '../support/focus.ts';
import { buildNotebook, cell as cellOf } from '../support/live.ts';

/** The main job by keyboard alone: the pointer is never used, and the focus can be seen at every stop. */
let page: Page;
const browsing = useBrowsing(async (server) => {
  const lead = await buildPerson(server, { email: 'kay@keyboard.example', name: 'Kay Lead' });
  const group = await buildGroup(server, lead, 'Keys alone');
  await buildNotebook(
    server,
    group,
    lead,
    [cellOf('intro', 'prose', '# What is asked'), cellOf('yeast', 'network', 'A <=> B | 2 /s, 1 /s')],
    { title: 'By hand' },
  );
});
beforeAll(async () => {
  ({ page } = await browsing.open('Kay'));
});

const cell = (name: string) => cellNamed(page, name);
const focus = () => expect.poll(async () => (await focusOn(page)).what, patience);
/** Whether the focus is within the Workings of a cell. */
const inWorkingsOf = (name: string) =>
  expect.poll(
    () =>
      cell(name).evaluate((place) => place.querySelector('.wk')?.contains(document.activeElement) === true),
    patience,
  );

describe('by keyboard alone', { timeout: 120_000 }, () => {
  test('one signs in', async () => {
    await page.goto('/sign-in');
    await page.getByRole('button', { name: 'Sign in', exact: true }).waitFor(patience);
    await pressUntil(page, 'Tab', /Email/u);
    await page.keyboard.type('kay@keyboard.example');
    await pressUntil(page, 'Tab', /Password/u);
    await page.keyboard.type(usualPassword);
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { name: 'The Shelf' }).waitFor(patience);
  });

  test('one opens a notebook', async () => {
    await page.getByText('By hand').first().waitFor(patience);
    await pressUntil(page, 'Tab', /By hand/u);
    await page.keyboard.press('Enter');
    await cell('yeast').waitFor(patience);
    await cell('yeast').locator('.cm-content').waitFor(patience);
  });

  test('one walks through the cells', async () => {
    await page.keyboard.press('Alt+ArrowDown');
    await focus().toMatch(/What is asked, prose/u);
    await page.keyboard.press('Alt+ArrowDown');
    await focus().toMatch(/^button yeast network/iu);
    expect((await focusOn(page)).hidden).toBeNull();
    await page.keyboard.press('Alt+ArrowUp');
    await focus().toMatch(/What is asked, prose/u);
    await page.keyboard.press('Alt+ArrowDown');
  });

  test('one writes a reaction and goes back to the slip', async () => {
    await page.keyboard.press('F2');
    await inWorkingsOf('yeast').toBe(true);
    await page.keyboard.press('Control+End');
    await page.keyboard.press('Enter');
    await page.keyboard.type('B -> C | 3 /s');
    await expect.poll(() => cell('yeast').locator('.cm-content').innerText(), patience).toMatch(/3 \/s/u);
    // The first Escape may close what completion offers.
    await pressUntil(page, 'Escape', /^button yeast network/iu, 2);
  });

  test('one sews in a cell that computes', async () => {
    await page.keyboard.press('Alt+n');
    await focus().toMatch(/^button Prose/iu);
    await pressUntil(page, 'Tab', /^button Structure/iu);
    await page.keyboard.press('Enter');
    // A, B, C: three complexes in one class of rank 2.
    await expect.poll(() => cell('structure1').locator('.eq .d b').innerText(), patience).toBe('0');
    await inWorkingsOf('structure1').toBe(true);
    await page.keyboard.press('Escape');
    await focus().toMatch(/^button structure1 structure/iu);
  });

  test('one holds the cell and releases it', async () => {
    await page.keyboard.press('Control+;');
    await page.getByRole('region', { name: /structure1, held/u }).waitFor(patience);
    await page.keyboard.press('Control+;');
    await page.getByRole('region', { name: /structure1, current/u }).waitFor(patience);
  });

  test('one puts the Workings away and takes them out again', async () => {
    const shown = page.getByRole('button', { name: 'Show the Workings' });
    await page.keyboard.press('Control+\\');
    await shown.waitFor(patience);
    await page.keyboard.press('Control+\\');
    await shown.waitFor({ ...patience, state: 'detached' });
  });

  test('Tab goes through the whole page, forward and back, and is caught nowhere', async () => {
    await page.keyboard.press('Alt+ArrowUp');
    await page.keyboard.press('F2');
    await inWorkingsOf('yeast').toBe(true);
    await pressUntil(page, 'Tab', /^button structure1 structure/iu);
    await pressUntil(page, 'Shift+Tab', /Title of the notebook/u, 120);
    await pressUntil(page, 'Tab', /^button Claim/iu, 160);
    await page.keyboard.press('Tab');
    expect((await focusOn(page)).what).not.toMatch(/^button Claim/iu);
  });

  test('F6 goes round the landmarks, F1 opens the list of keys and Escape closes it', async () => {
    await pressUntil(page, 'F6', /Stillroom/u, 4);
    await page.keyboard.press('F1');
    const keys = page.getByRole('complementary', { name: 'Keys' });
    await keys.waitFor(patience);
    await page.keyboard.press('Escape');
    await keys.waitFor({ ...patience, state: 'detached' });
  });

  test('one freezes a record', async () => {
    await pressUntil(page, 'F6', /Stillroom/u, 4);
    await pressUntil(page, 'Tab', /Freeze a record/u);
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { name: 'Before it is frozen' }).waitFor(patience);
    await expect
      .poll(() => page.getByRole('button', { name: 'Freeze the record' }).isEnabled(), patience)
      .toBe(true);
    await pressUntil(page, 'Tab', /^button Freeze the record/u);
    await page.keyboard.press('Enter');
    await page.waitForURL(/\/records\//u, patience);
    await page.getByRole('heading', { name: 'By hand' }).waitFor(patience);
  });
});
