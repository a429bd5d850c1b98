import type { NotebookFile } from '@stillroom/shared/notebook-file';
import type { Page } from 'playwright-core';
import { describe, expect, test } from 'vitest';
import { cellNamed, patience, useBrowsing, words } from '../support/browsing.ts';
import { buildGroup, buildMember, buildPerson, signIn } from '../support/build.ts';
import type { WatchedPage } from '../support/chromium.ts';
import { buildNotebook, cell } from '../support/live.ts';
import { startServerProcess } from '../support/server-process.ts';
import type { Visitor } from '../support/visitor.ts';

/** The line to the server, lost in mid-edit: the page tells the truth about it, and nothing typed is lost. */
let asLead: Visitor;
/** One whose role is taken in time. */
let ben: string;
let group: string;
/** A notebook to write in. */
let draft: string;
const address = (key: string) => `${key}@lost-line.example`;

const browsing = useBrowsing(async (server) => {
  const ada = await buildPerson(server, { email: address('ada'), name: 'Ada Lead' });
  const author = await buildPerson(server, { email: address('ben'), name: 'Ben Author' });
  const built = await buildGroup(server, ada, 'Lost Line');
  await buildMember(server, built, author, 'author');
  [ben, group] = [author.id, built.id];
  asLead = await signIn(server, ada);
  draft = await buildNotebook(server, built, ada, [cell('ledger', 'network', 'A <=> B | 2 /s, 1 /s')]);
});

/** The text of a cell as the server keeps it. */
async function keptText(notebook: string, name: string): Promise<string> {
  const { body } = await asLead.get(`/api/notebooks/${notebook}/file`);
  return (body as NotebookFile).cells.find((one) => one.name === name)?.text ?? '';
}

async function typeInto(page: Page, name: string, text: string): Promise<void> {
  await cellNamed(page, name).locator('.cm-content').first().click(patience);
  await page.keyboard.press('Control+End');
  await page.keyboard.type(text);
}

/** Somebody with the notebook open whose line has just gone. */
async function loseTheLine(): Promise<WatchedPage> {
  const watched = await browsing.enter(address('ben'));
  const { page, context } = watched;
  await page.goto(`/notebooks/${draft}`);
  await cellNamed(page, 'ledger').waitFor(patience);
  await words(page, /^Kept /u);
  await context.setOffline(true);
  await words(page, /The line to the server is down since/u);
  return watched;
}

/** Waits until what the page handed to its store is on the disk: a transaction waits for those before it. */
const storedHere = (page: Page) =>
  page.evaluate(async () => {
    for (const { name = '' } of await indexedDB.databases()) {
      await new Promise((resolve, reject) => {
        const opening = indexedDB.open(name);
        opening.onerror = reject;
        opening.onsuccess = () => {
          const look = opening.result.transaction('updates', 'readonly');
          look.objectStore('updates').count();
          look.oncomplete = resolve;
        };
      });
    }
  });

describe('the line', { timeout: 180_000 }, () => {
  test('when it is lost, the page says so, and what was typed arrives when it is back', async () => {
    const { page, context } = await loseTheLine();
    await typeInto(page, 'ledger', '\nB -> C | 3 /s');
    await words(page, /changes? kept here only/u);
    expect(await keptText(draft, 'ledger')).not.toContain('B -> C');
    await context.setOffline(false);
    await words(page, /^Kept /u);
    await page.getByText(/The line to the server is down/u).waitFor({ ...patience, state: 'detached' });
    expect(await keptText(draft, 'ledger')).toMatch(/B -> C +\| 3 \/s/u);
    await context.close();
  });

  test('what was written offline survives closing the tab', async () => {
    const { page, context } = await loseTheLine();
    await typeInto(page, 'ledger', '\nC -> D | 4 /s');
    await words(page, /changes? kept here only/u);
    await expect
      .poll(() => cellNamed(page, 'ledger').locator('.cm-content').first().innerText(), patience)
      .toMatch(/C\s*->\s*D\s*\|\s*4 \/s/u);
    await storedHere(page);
    await page.close();
    expect(await keptText(draft, 'ledger')).not.toContain('C -> D');

    await context.setOffline(false);
    const again = await context.newPage();
    await again.goto(`/notebooks/${draft}`);
    await expect
      .poll(() => cellNamed(again, 'ledger').locator('.cm-content').first().innerText(), patience)
      .toMatch(/C\s*->\s*D/u);
    await expect.poll(() => keptText(draft, 'ledger'), patience).toMatch(/C -> D +\| 4 \/s/u);
    await context.close();
  });

  test('a server that ends and comes back in mid-edit loses nothing typed', async () => {
    const settings = { DATABASE_URL: browsing.server.database.url, PROCESS: 'server' };
    let other = await startServerProcess({ ...settings, PORT: '0' });
    const port = String(other.port);
    try {
      const { page, context } = await browsing.enter(address('ben'), { at: `http://127.0.0.1:${port}` });
      await page.goto(`/notebooks/${draft}`);
      await cellNamed(page, 'ledger').waitFor(patience);
      await words(page, /^Kept /u);
      await typeInto(page, 'ledger', '\nD -> E | 5 /s');
      await other.kill();
      await page.keyboard.type(', note = 1');
      await words(page, /The line to the server is down since/u);
      await words(page, /changes? kept here only/u);
      await page.keyboard.type(' # still writing');
      other = await startServerProcess({ ...settings, PORT: port });
      await words(page, /^Kept /u);
      expect(await keptText(draft, 'ledger')).toMatch(/D -> E +\| 5 \/s, note = 1 +# still writing/u);
      await context.close();
    } finally {
      await other.kill();
    }
  });

  test('what was written while a role was taken away is set aside when the line is back', async () => {
    const { page, context } = await loseTheLine();
    await typeInto(page, 'ledger', '\nE -> F | 6 /s');
    await words(page, /changes? kept here only/u);
    const change = { role: 'reader', notebooks: null };
    expect((await asLead.patch(`/api/groups/${group}/members/${ben}`, change)).status).toBe(200);
    await context.setOffline(false);
    const aside = page.getByRole('alert', { name: 'Text set aside' });
    await aside.waitFor(patience);
    expect(await aside.textContent()).toMatch(/E -> F +\| 6 \/s/u);
    await expect.poll(() => cellNamed(page, 'ledger').textContent(), patience).not.toMatch(/E -> F/u);
    expect(await keptText(draft, 'ledger')).not.toContain('E -> F');
    await context.close();
  });
});
