import type { GroupView, ReviewSummary } from '@stillroom/shared/contracts';
import type { Page } from 'playwright-core';
import { beforeAll, describe, expect, test } from 'vitest';
import { cellNamed, patience, useBrowsing, words } from '../support/browsing.ts';
import { buildGroup, buildMember, buildPerson, signIn } from '../support/build.ts';
import { buildNotebook, cell } from '../support/live.ts';
import { Visitor } from '../support/visitor.ts';

/** What goes wrong in daily use, as people see it: each trouble has its own words, and nothing typed is lost. */
let asLead: Visitor;
let group: { readonly id: string };
let lead: { readonly id: string };
/** Cells in trouble beside cells that are well. */
let trouble: string;
/** A notebook to write in. */
let draft: string;
const address = (key: string) => `${key}@bad-input.example`;

const browsing = useBrowsing(async (server) => {
  const [ada, ben, cyd] = [
    await buildPerson(server, { email: address('ada'), name: 'Ada Lead' }),
    await buildPerson(server, { email: address('ben'), name: 'Ben Author' }),
    await buildPerson(server, { email: address('cyd'), name: 'Cyd Reader' }),
  ];
  await buildPerson(server, { email: address('dee'), name: 'Dee Outsider' });
  lead = ada;
  group = await buildGroup(server, ada, 'Bad Input');
  await buildMember(server, group, ben, 'author');
  await buildMember(server, group, cyd, 'reader');
  asLead = await signIn(server, ada);
  trouble = await buildNotebook(server, group, ada, [
    cell('endless', 'script', 'while (true) {}'),
    cell('broken', 'network', 'A <=> B | 1 /s, 2 /s\nA --> B | 1 /s'),
    cell('yeast', 'network', 'A <=> B | 2 /s, 1 /s'),
    cell('shape', 'structure', '', { settings: { network: 'yeast' } }),
    cell('one', 'claim', '1 < 2', { name: 'twin' }),
    cell('two', 'claim', '2 < 3', { name: 'twin' }),
    cell('burst', 'network', '2 A -> 3 A | 1000 /M/s\nstart A = 1 M'),
    cell('run', 'trajectory', '', { settings: { network: 'burst', until: 1 } }),
  ]);
  draft = await buildNotebook(server, group, ada, [cell('ledger', 'network', 'A <=> B | 2 /s, 1 /s')]);
});

describe('ways in that are closed', { timeout: 120_000 }, () => {
  test('a wrong password keeps what was typed and says what to do', async () => {
    const { page, context } = await browsing.open('a visitor');
    await page.goto('/sign-in');
    await page.getByLabel('Email').fill(address('ada'));
    await page.locator('#password').fill('not the password');
    await page.getByRole('button', { name: 'Sign in', exact: true }).click();
    await page.getByRole('alert').first().waitFor(patience);
    expect(await page.getByRole('alert').first().innerText()).toMatch(/password/iu);
    expect(await page.getByLabel('Email').inputValue()).toBe(address('ada'));
    await context.close();
  });

  test('an address where nothing stands, a notebook that is not open to one, a page that one may not use', async () => {
    const outsider = await browsing.enter(address('dee'));
    await outsider.page.goto('/no/such/page');
    await words(outsider.page, 'Nothing stands at this address');
    await outsider.page.goto(`/notebooks/${draft}`);
    await words(outsider.page, 'No such notebook is open to you');
    await outsider.page.getByRole('link', { name: 'To the Shelf' }).waitFor(patience);
    await outsider.context.close();

    const reader = await browsing.enter(address('cyd'));
    await reader.page.goto(`/notebooks/${draft}/freeze`);
    await reader.page.getByRole('alert').first().waitFor(patience);
    expect(await reader.page.getByRole('alert').first().innerText()).toMatch(/reader|author|lead/iu);
    expect(await reader.page.getByRole('button', { name: 'Freeze the record' }).isEnabled()).toBe(false);
    await reader.context.close();
  });

  test('a link opened while signed in as someone else', async () => {
    await asLead.post(`/api/groups/${group.id}/invitations`, {
      email: address('eve'),
      role: 'author',
      notebooks: null,
      message: '',
    });
    const [letter] = await browsing.server.sql<{ text: string }>(
      'select text from mail where recipient = $1',
      [address('eve')],
    );
    const { page, context } = await browsing.enter(address('dee'));
    await page.goto(/\/invitation\/[\w-]+/u.exec(letter?.text ?? '')?.[0] ?? 'no letter');
    await words(page, `You are signed in as ${address('dee')}.`);
    await words(page, `The letter went to ${address('eve')}.`);
    await page.getByRole('button', { name: 'sign out' }).click();
    await page.getByLabel('Your name, as it should stand on a title page').waitFor(patience);
    await context.close();
  });

  test('a review link that is wrong, used, at its end or taken back', async () => {
    const paper = await buildNotebook(browsing.server, group, lead, [cell('sum', 'claim', '1 < 2')], {
      title: 'Paper',
    });
    await expect
      .poll(
        async () => (await asLead.post(`/api/notebooks/${paper}/freeze`, { reasons: {} })).status,
        patience,
      )
      .toBe(201);
    const { records } = (await asLead.get(`/api/groups/${group.id}`)).body as GroupView;
    const record = records.find(({ title }) => title === 'Paper')?.id ?? '';
    const invite = async (name: string) => {
      const until = new Date(Date.now() + 20 * 86_400_000).toISOString().slice(0, 10);
      const invitation = { email: address(name), name, masked: false, until, message: '' };
      const { body } = await asLead.post(`/api/records/${record}/reviews`, invitation);
      const [letter] = await browsing.server.sql<{ text: string }>(
        'select text from mail where recipient = $1',
        [address(name)],
      );
      return {
        id: (body as ReviewSummary).id,
        link: /\/review\/[\w-]+/u.exec(letter?.text ?? '')?.[0] ?? '',
      };
    };
    const [used, ended, taken] = [await invite('used'), await invite('ended'), await invite('taken')];
    const { page, context } = await browsing.open('a visitor');

    await page.goto('/review/AAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAA');
    await words(page, 'This link does not open a review.');

    await browsing.server.sql(`update review set until = '2020-01-01' where id = $1`, [ended.id]);
    await page.goto(ended.link);
    await words(page, /This link worked until 1 January 2020\./u);

    await asLead.delete(`/api/records/${record}/reviews/${taken.id}`);
    await page.goto(taken.link);
    await words(page, /This invitation was withdrawn on /u);

    await new Visitor(browsing.server.url).put(`/api${used.link}/verdict`, {
      recommendation: 'take',
      toAuthors: 'Good.',
      toEditor: '',
      claims: {},
    });
    await page.goto(used.link);
    await words(page, /You sent your verdict/u);
    expect(await page.getByRole('button', { name: 'Rerun every cell' }).count()).toBe(0);
    await context.close();
  });
});

describe('cells in trouble, beside cells that go on', { timeout: 180_000 }, () => {
  let page: Page;
  beforeAll(async () => {
    ({ page } = await browsing.enter(address('ben')));
    await page.goto(`/notebooks/${trouble}`);
    await cellNamed(page, 'broken').waitFor(patience);
  }, 120_000);

  test('an error of notation: line, column, cause and remedy, in the editor and in the result', async () => {
    const place = cellNamed(page, 'broken');
    await place.scrollIntoViewIfNeeded();
    const inEditor = place.getByRole('note', { name: 'Error in line 2' });
    await inEditor.waitFor(patience);
    expect(await inEditor.getByRole('button').count()).toBeGreaterThan(0);
    const inResult = place.locator('.rc .note.st-failed');
    await inResult.waitFor(patience);
    const said = await inResult.innerText();
    expect(said).toMatch(/Line 2, column 3\./u);
    expect(said).toContain('What to do.');
  });

  test('the others go on', async () => {
    await cellNamed(page, 'shape').scrollIntoViewIfNeeded();
    await page.getByRole('region', { name: /shape, current/u }).waitFor(patience);
    // A <=> B: two complexes in one class of rank 1.
    expect(await cellNamed(page, 'shape').locator('.eq .d b').innerText()).toBe('0');
  });

  test('two cells of one name', async () => {
    const twins = cellNamed(page, 'twin');
    await expect.poll(() => twins.count(), patience).toBe(2);
    for (const twin of await twins.all()) {
      await twin.scrollIntoViewIfNeeded();
      await twin.getByText('Two cells are called twin.').first().waitFor(patience);
      await twin.getByText('Give this one or the other another name.').first().waitFor(patience);
    }
  });

  test('a course that blows up ends with its cause, and what there was of it is drawn', async () => {
    const run = cellNamed(page, 'run');
    await run.scrollIntoViewIfNeeded();
    // dA/dt = 1000 A^2 from 1: the exact course leaves every bound at t = 1/1000.
    await run.getByText(/The course ends early, at 0\.00(1|0999)/u).waitFor(patience);
    await run
      .getByText(/A grows without bound/u)
      .first()
      .waitFor(patience);
    expect(await run.locator('svg').count()).toBeGreaterThan(0);
  });

  test('a script without end is stopped at its deadline, and only its cell fails', async () => {
    const endless = cellNamed(page, 'endless');
    await endless.scrollIntoViewIfNeeded();
    await endless.getByText(/The time allowed.* is over\./u).waitFor({ timeout: 150_000 });
    await page.getByRole('region', { name: /endless, failed/u }).waitFor(patience);
    await page.getByRole('region', { name: /shape, current/u }).waitFor(patience);
  });
});

describe('files', { timeout: 120_000 }, () => {
  test('a notebook file edited by hand is refused in words', async () => {
    const { page, context } = await browsing.enter(address('ben'));
    const file = (text: string) => ({
      name: 'edited.stillroom.json',
      mimeType: 'application/json',
      buffer: Buffer.from(text),
    });
    const doubled = {
      format: 'stillroom-notebook/1',
      title: 'Edited',
      cells: ['a', 'b'].map((id) => ({ id, kind: 'claim', name: 'sum', text: '1 < 2', settings: {} })),
    };
    await page.goto('/');
    await page.getByRole('button', { name: 'New notebook' }).click();
    const input = page.getByLabel('Or from a notebook file');
    await input.setInputFiles(file(JSON.stringify(doubled)));
    await page.getByRole('button', { name: 'Begin it' }).click();
    await words(page, /Cells 1 and 2 of the file are both called sum\./u);
    await input.setInputFiles(file(JSON.stringify(doubled).slice(0, -4)));
    await page.getByRole('button', { name: 'Begin it' }).click();
    await words(page, /is not a notebook file/u);
    const shelf = (await asLead.get('/api/shelf')).body as { notebooks: readonly { title: string }[] };
    expect(shelf.notebooks.map(({ title }) => title)).not.toContain('Edited');
    await context.close();
  });
});
