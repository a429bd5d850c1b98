import type { Page } from 'playwright-core';
import { describe, expect, test } from 'vitest';
import { violationsInBothThemes } from '../support/axe.ts';
import { cellNamed, useBrowsing } from '../support/browsing.ts';
import { buildGroup, buildPerson, usualPassword } from '../support/build.ts';
import { signIn } from '../support/chromium.ts';

/** The ledger of a network as one types in it, as text and as a table. */
const browsing = useBrowsing(async (server) => {
  const person = await buildPerson(server, { email: 'eva@ledger.example', name: 'Eva Editor' });
  await buildGroup(server, person, 'Ledgers');
});

const cell = (page: Page) => cellNamed(page, 'network1');
const editor = (page: Page) => cell(page).locator('.cm-content').first();
const field = (page: Page, row: string, name: string) => cell(page).getByLabel(`${row}, ${name}`);

/** The text of the network as it stands, without what the editor only draws. */
const textOf = (page: Page): Promise<string> =>
  editor(page).evaluate((content) =>
    [...content.querySelectorAll('.cm-line')]
      .map((line) => (line.textContent ?? '').replaceAll('\u200b', ''))
      .join('\n'),
  );

async function write(page: Page, text: string): Promise<void> {
  await editor(page).click();
  await page.keyboard.press('Control+a');
  await page.keyboard.press('Delete');
  await page.keyboard.type(text);
}

const show = (page: Page, view: 'Text' | 'Table') =>
  cell(page).getByRole('button', { name: view, exact: true }).click();

describe('the ledger of a network', { timeout: 90_000 }, () => {
  let page: Page;
  let other: Page;
  let address: string;

  test('a notebook with a network', async () => {
    ({ page } = await browsing.open('Eva'));
    await signIn(page, 'eva@ledger.example', usualPassword);
    await page.getByRole('link', { name: 'Shelf' }).click();
    await page.getByRole('button', { name: 'New notebook' }).click();
    await page.getByLabel('Title').fill('A ledger');
    await page.getByRole('button', { name: 'Begin it' }).click();
    await page.waitForURL(/\/notebooks\//);
    address = new URL(page.url()).pathname;
    await page.getByRole('button', { name: 'Network', exact: true }).click();
    await cell(page).waitFor();
  });

  test('an error is told in place, and its repair mends it', async () => {
    await write(page, 'D + E <=> DE | kf = 0.1 /uM/s, kr = 2 | binding');
    const note = cell(page).getByRole('note', { name: /Error in line 1/ });
    await note.getByText('kr has no unit, but other values of this text have.').waitFor();
    await note.getByRole('button', { name: 'Make it 2 /s' }).click();
    await expect.poll(() => textOf(page)).toBe('D + E <=> DE | kf = 0.1 /uM/s, kr = 2 /s | binding');
    await expect.poll(() => note.count()).toBe(0);
  });

  test('colours come from the reader of the notation', async () => {
    await expect.poll(() => cell(page).locator('.nt-note').innerText()).toBe('binding');
    expect(await cell(page).locator('.nt-number').allInnerTexts()).toEqual(['0.1', '/uM/s', '2', '/s']);
  });

  test('Enter begins a line while a completion is on offer; an arrow and Enter take one', async () => {
    await write(page, 'Enzyme + S -> P | kcat = 1\nEnz');
    await page.locator('.cm-tooltip-autocomplete').waitFor();
    await page.keyboard.press('Enter');
    await expect.poll(() => textOf(page)).toBe('Enzyme + S -> P | kcat = 1\nEnz\n');
    await page.keyboard.type('Enz');
    await page.locator('.cm-tooltip-autocomplete').waitFor();
    await page.keyboard.press('ArrowDown');
    // The list takes no keys in its first moments, so that nobody chooses what they have not seen.
    await expect
      .poll(async () => {
        await page.keyboard.press('ArrowDown');
        return page.locator('.cm-tooltip-autocomplete [aria-selected=true]').count();
      })
      .toBe(1);
    await page.keyboard.press('Enter');
    await expect.poll(() => textOf(page)).toMatch(/\nEnz\nEnz\w+$/);
  });

  test('a long text is checked as well, away from the page', async () => {
    const rows = Array.from({ length: 60 }, (_, i) => `A${i} -> A${i + 1} | k${i} = 1 /s`).join('\n');
    await editor(page).click();
    await page.keyboard.press('Control+a');
    await page.keyboard.insertText(`start A0 = 1 uM, Z = 2 uM\n\n${rows}`);
    await cell(page).getByRole('note').getByText(/Z/).first().waitFor();
  });

  test('bars are aligned in the text as one types, and one undo takes back typing and blanks', async () => {
    await write(page, 'A -> B | k = 1\nAA + BB -> C | q = 2');
    await expect.poll(() => textOf(page)).toBe('A -> B       | k = 1\nAA + BB -> C | q = 2');
    await page.waitForTimeout(600);
    await page.keyboard.press('Home');
    await page.keyboard.type('2 ');
    await expect.poll(() => textOf(page)).toBe('A -> B         | k = 1\n2 AA + BB -> C | q = 2');
    await page.keyboard.press('Control+z');
    await expect.poll(() => textOf(page)).toBe('A -> B       | k = 1\nAA + BB -> C | q = 2');
  });

  test('a pasted list of reactions becomes notation', async () => {
    await write(page, '# pasted\n');
    await editor(page).evaluate((content) => {
      const data = new DataTransfer();
      data.setData('text/plain', '1. A + B => C\n2. C <==> D');
      content.dispatchEvent(
        new ClipboardEvent('paste', { clipboardData: data, bubbles: true, cancelable: true }),
      );
    });
    await expect.poll(() => textOf(page)).toBe('# pasted\nA + B -> C\nC <=> D');
  });

  test('the table edits the same text, also for whoever else has it open', async () => {
    await write(page, 'A -> B | k = 1\nB -> C | q = 2\nstart A = 1');
    const watched = await browsing.open('Eva on a phone', { width: 390, height: 800 });
    other = watched.page;
    await signIn(other, 'eva@ledger.example', usualPassword);
    await other.goto(address);
    await show(page, 'Table');
    await field(page, 'R2', 'constants').fill('q = 25');
    await field(page, 'New row', 'reaction').pressSequentially('C -> A');
    await field(page, 'R3', 'note').pressSequentially('and back');
    expect(await field(page, 'R3', 'reaction').inputValue()).toBe('C -> A');
    await show(page, 'Text');
    await expect
      .poll(() => textOf(page))
      .toBe('A -> B | k = 1\nB -> C | q = 25\nC -> A |  | and back\nstart A = 1');
  });

  test('an error stands at its row, and its repair mends it', async () => {
    await show(page, 'Table');
    await field(page, 'R1', 'constants').fill('k = 1 /s');
    const row = cell(page)
      .getByRole('row')
      .filter({ has: page.getByLabel('R2, constants') });
    await row.getByRole('button', { name: 'Make it 25 /s' }).waitFor();
    expect(await violationsInBothThemes(page)).toEqual([]);
    await row.getByRole('button', { name: 'Make it 25 /s' }).click();
    await expect.poll(() => field(page, 'R2', 'constants').inputValue()).toBe('q = 25 /s');
  });

  test('keys go from row to row, and a row is taken away', async () => {
    await field(page, 'R1', 'reaction').focus();
    await page.keyboard.press('ArrowDown');
    expect(await page.evaluate(() => document.activeElement?.getAttribute('aria-label'))).toBe(
      'R2, reaction',
    );
    await cell(page).getByRole('button', { name: 'Take R2 away' }).click();
    await expect.poll(() => field(page, 'R2', 'reaction').inputValue()).toBe('C -> A');
  });

  test('a phone shows the table, whole, and what one writes there is seen here', async () => {
    await other.getByRole('button', { name: 'Workings', exact: true }).first().click();
    await field(other, 'R2', 'note').fill('from afar');
    await expect.poll(() => field(page, 'R2', 'note').inputValue()).toBe('from afar');
    expect(await violationsInBothThemes(other)).toEqual([]);
    expect(await other.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
    for (const { troubles } of browsing.people.values()) expect(troubles).toEqual([]);
  });
});
