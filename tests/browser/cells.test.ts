import type { Page } from 'playwright-core';
import { describe, expect, test } from 'vitest';
import { violationsInBothThemes } from '../support/axe.ts';
import { cellNamed, patience, useBrowsing, words } from '../support/browsing.ts';
import { buildGroup, buildMember, buildPerson } from '../support/build.ts';
import { buildNotebook, cell } from '../support/live.ts';

let notebook = '';

/** What one does within a cell: trying values, seeing where others are, reading what failed. */
const browsing = useBrowsing(async (server) => {
  const ada = await buildPerson(server, { email: 'ada@cells.example', name: 'Ada Author' });
  const ben = await buildPerson(server, { email: 'ben@cells.example', name: 'Ben Bold' });
  const group = await buildGroup(server, ada, 'Cells');
  await buildMember(server, group, ben, 'author');
  notebook = await buildNotebook(server, group, ada, [
    cell('question', 'prose', '# The question\n\nDoes the **lager** clear before the tank is moved?'),
    cell('decay', 'network', '0 -> A | ks = 0.5 uM/s | supply\nA -> B | k = 1 /s\nstart A = 8 uM'),
    cell('run', 'trajectory', '', { settings: { network: 'decay', until: 4, points: 20 } }),
    cell('shape', 'structure', '', { settings: { network: 'decay' } }),
    cell('tells', 'script', 'print("so far")\nthrow new Error("on purpose")'),
  ]);
});

const open = async (page: Page, url: string) => {
  await page.goto(`${url}/notebooks/${notebook}`);
  await cellNamed(page, 'run').getByRole('img').first().waitFor(patience);
};

describe('cells', { timeout: 90_000 }, () => {
  let ada: Page;
  let ben: Page;

  test('two authors open the same notebook', async () => {
    ({ page: ada } = await browsing.enter('ada@cells.example'));
    ({ page: ben } = await browsing.enter('ben@cells.example'));
    await open(ada, browsing.server.url);
    await open(ben, browsing.server.url);
  });

  test('a value is tried with a slider, over the figure and for one’s own eyes', async () => {
    const run = cellNamed(ada, 'run');
    await run.getByRole('button', { name: 'Try values' }).click();
    const slider = run.getByRole('slider', { name: 'ks supply' });
    await slider.focus();
    for (let i = 0; i < 10; i++) await slider.press('ArrowRight');
    await run.getByText('with your trial laid over it').waitFor(patience);
    await run.locator('.tried path').first().waitFor(patience);
    expect(await slider.getAttribute('aria-valuetext')).toBe('0.629 µM s⁻¹');
    expect(await ben.getByText('for your eyes only').count()).toBe(0);
  });

  test('trying passes axe in both themes', async () => {
    expect(await violationsInBothThemes(ada)).toEqual([]);
  });

  test('what was tried is written into the network, and the trial is over', async () => {
    const run = cellNamed(ada, 'run');
    await run.getByRole('button', { name: 'Write 0.629 into decay' }).click();
    await words(ben, '0.629');
    await expect.poll(() => run.getByText('laid over it').count(), patience).toBe(0);
  });

  test('a co-author’s selection lies over typeset prose, with a name', async () => {
    await ben.locator('[data-write]').first().click();
    const editor = ben.locator('.kind-prose .cm-content');
    await editor.waitFor(patience);
    await editor.press('Control+a');
    const prose = ada.locator('.kind-prose [data-write]');
    await prose.getByText('Ben', { exact: true }).waitFor(patience);
    const laid = () =>
      ada.evaluate(() => [...CSS.highlights.values()].flatMap((held) => [...held].map(String)).join(' '));
    await expect.poll(laid, patience).toContain('Does the lager clear');
  });

  test('a co-author’s caret stands in the field of a row', async () => {
    await ben.locator('.kind-network .cm-line').first().click();
    await cellNamed(ada, 'decay').getByRole('button', { name: 'Table', exact: true }).click();
    await ada.getByRole('img', { name: 'Ben Bold is in this field' }).waitFor(patience);
  });

  test('a script that failed shows what it had printed', async () => {
    const tells = cellNamed(ada, 'tells');
    await tells.scrollIntoViewIfNeeded();
    await tells.getByText('printed before it failed, 1 line').waitFor(patience);
    await tells.getByText('so far', { exact: true }).waitFor(patience);
  });

  test('siphons and robust species stand beside the verdicts', async () => {
    const shape = cellNamed(ada, 'shape');
    await shape.scrollIntoViewIfNeeded();
    await shape.getByText('Minimal siphons').waitFor(patience);
    await shape.getByText('Robust species').waitFor(patience);
  });
});
