import type { Page } from 'playwright-core';
import { describe, expect, test } from 'vitest';
import { useBrowsing } from '../support/browsing.ts';
import { buildGroup, buildPerson, usualPassword } from '../support/build.ts';
import { signIn } from '../support/chromium.ts';

/**
 * The whole main job in real browsers, as its people do it: the lead invites, two authors write one network at once, a
 * plot and a claim rest on it, the notebook is frozen, a reviewer reruns the record, and a role taken away counts at once.
 */
const browsing = useBrowsing(async (server) => {
  const lead = await buildPerson(server, { email: 'ada@main-job.example', name: 'Ada Lead' });
  await buildGroup(server, lead, 'Main Job');
});

const arrive = async (name: string): Promise<Page> => (await browsing.open(name)).page;

/** The newest letter to somebody, and the path its link leads to. */
async function linkTo(email: string, path: 'invitation' | 'review'): Promise<string> {
  const [letter] = await browsing.server.sql<{ text: string }>(
    'select text from mail where recipient = $1 order by at desc limit 1',
    [email],
  );
  const link = new RegExp(`/${path}/[\\w-]+`).exec(letter?.text ?? '')?.[0];
  if (link === undefined) throw new Error(`No letter with a link for ${path} was written to ${email}.`);
  return link;
}

async function invite(page: Page, email: string, role: 'Author' | 'Reader'): Promise<void> {
  const panel = page.getByRole('region', { name: /Invite someone to/ });
  await panel.getByLabel('Email').fill(email);
  await panel.getByLabel(new RegExp(`^${role}`)).check();
  await panel.getByRole('button', { name: 'Send the invitation' }).click();
  await panel.getByText(`The invitation to ${email} is on its way.`).waitFor();
}

async function join(name: string, email: string): Promise<Page> {
  const page = await arrive(name);
  await page.goto(await linkTo(email, 'invitation'));
  await page.getByLabel('Your name, as it should stand on a title page').fill(name);
  await page.locator('#password').fill(usualPassword);
  await page.getByRole('button', { name: /^Join / }).click();
  await page.getByRole('heading', { name: 'Main Job' }).waitFor();
  return page;
}

/** The cell's whole region, by its name. */
const cell = (page: Page, name: string) => page.getByRole('region', { name: new RegExp(`\\b${name}, `) });
const editor = (page: Page, name: string) => cell(page, name).locator('.cm-content').first();
const deficiencyOn = (page: Page) => cell(page, 'structure1').locator('.eq .d b');

async function typeAtEnd(page: Page, name: string, text: string): Promise<void> {
  await editor(page, name).click();
  await page.keyboard.press('Control+End');
  await page.keyboard.type(text);
}

const sewIn = (page: Page, kind: string) =>
  page.getByRole('region', { name: 'Next cell' }).getByRole('button', { name: kind, exact: true }).click();

describe('the main job', { timeout: 120_000 }, () => {
  let lead: Page;
  let author: Page;
  let reader: Page;
  let address: string;
  let record: string;

  test('the lead begins a notebook and invites an author and a reader', async () => {
    lead = await arrive('Ada Lead');
    await signIn(lead, 'ada@main-job.example', usualPassword);
    await lead.getByRole('link', { name: 'Groups' }).click();
    await lead.getByRole('link', { name: 'Main Job' }).click();
    await lead.getByRole('button', { name: 'Invite someone…' }).click();
    await invite(lead, 'ben@main-job.example', 'Author');
    await invite(lead, 'cyd@main-job.example', 'Reader');

    author = await join('Ben Author', 'ben@main-job.example');
    reader = await join('Cyd Reader', 'cyd@main-job.example');

    await lead.getByRole('link', { name: 'Shelf' }).click();
    await lead.getByRole('button', { name: 'New notebook' }).click();
    await lead.getByLabel('Title').fill('An enzyme, opened');
    await lead.getByRole('button', { name: 'Begin it' }).click();
    await lead.waitForURL(/\/notebooks\//);
    address = new URL(lead.url()).pathname;
    await lead.getByRole('button', { name: 'Network', exact: true }).click();
    await cell(lead, 'network1').waitFor();
  });

  test('two authors edit the same network at once; both see both edits and the deficiency', async () => {
    await author.goto(address);
    await cell(author, 'network1').waitFor();
    await typeAtEnd(lead, 'network1', 'E + S <=> ES -> E + P | kf = 0.1 /uM/s, kr = 2 /s, kc = 1.5 /s');
    await expect.poll(() => editor(author, 'network1').innerText()).toMatch(/kc = 1.5/);
    await Promise.all([
      typeAtEnd(lead, 'network1', '\n# the closed mechanism\n'),
      (async () => {
        await editor(author, 'network1').click();
        await author.keyboard.press('Control+Home');
        await author.keyboard.type('start E = 1 uM, S = 10 uM\n');
      })(),
    ]);
    for (const page of [lead, author]) {
      await expect
        .poll(() => editor(page, 'network1').innerText(), { timeout: 30_000 })
        .toContain('start E = 1 uM');
      await expect.poll(() => editor(page, 'network1').innerText()).toContain('# the closed mechanism');
    }
    await sewIn(lead, 'Structure');
    // n = 3, one linkage class, rank 2: deficiency 0 (the closed Michaelis-Menten mechanism).
    for (const page of [lead, author]) {
      await expect.poll(() => deficiencyOn(page).innerText(), { timeout: 30_000 }).toBe('0');
    }
    // With S -> 0 and 0 -> S the complexes become 5 in 2 classes of rank 3: deficiency 0 still; 2 S -> S makes it 1.
    await typeAtEnd(
      author,
      'network1',
      '0 <=> S | feed = 0.3 uM/s, wash = 0.05 /s\n2 S -> 3 S | b = 0.001 /uM/s\n',
    );
    for (const page of [lead, author]) {
      await expect.poll(() => deficiencyOn(page).innerText(), { timeout: 30_000 }).toBe('1');
    }
  });

  test('the reader sees the fair copy and has nothing to write with', async () => {
    await reader.goto(address);
    await reader.getByText('deficiency').first().waitFor();
    expect(await reader.locator('.cm-content[contenteditable="true"]').count()).toBe(0);
    expect(await reader.getByRole('button', { name: 'Freeze a record…' }).count()).toBe(0);
  });

  test('a trajectory, its plot and a claim about it', async () => {
    await sewIn(lead, 'Trajectory');
    const course = cell(lead, 'run1');
    await course.waitFor();
    const until = course.getByLabel(/Time/).first();
    await until.fill('60');
    await until.press('Tab');
    await expect.poll(() => course.locator('svg').count(), { timeout: 30_000 }).toBeGreaterThan(0);
    await sewIn(lead, 'Plot');
    await expect.poll(() => cell(author, 'plot1').locator('svg.marks').count(), { timeout: 30_000 }).toBe(1);
    await sewIn(lead, 'Claim');
    await cell(lead, 'claim1').waitFor();
    await typeAtEnd(lead, 'claim1', 'structure1.counts.deficiency == 1');
    for (const page of [lead, author]) {
      // What is out of sight is not laid out, and has no words to be read.
      await cell(page, 'claim1').scrollIntoViewIfNeeded();
      await expect
        .poll(() => cell(page, 'claim1').locator('.vband').first().innerText(), { timeout: 30_000 })
        .toMatch(/holds/);
    }
  });

  test('the notebook is frozen', async () => {
    await lead
      .getByRole('link', { name: /^Freeze a record/ })
      .or(lead.getByRole('button', { name: /^Freeze a record/ }))
      .click();
    await lead.getByRole('heading', { name: 'Before it is frozen' }).waitFor();
    const freeze = lead.getByRole('button', { name: 'Freeze the record' });
    await expect.poll(() => freeze.isEnabled(), { timeout: 30_000 }).toBe(true);
    await freeze.click();
    await lead.waitForURL(/\/records\//);
    record = new URL(lead.url()).pathname;
    await lead.getByRole('heading', { name: 'An enzyme, opened' }).waitFor();
  });

  test('a reviewer opens the link, reruns, sees every cell match, cannot edit, leaves a remark', async () => {
    await lead.getByRole('button', { name: 'Invite a reviewer…' }).click();
    await lead.getByLabel('Email').fill('dee@main-job.example');
    await lead.getByLabel('Name', { exact: true }).fill('Dee Reviewer');
    await lead.getByRole('button', { name: 'Send the invitation' }).click();
    await lead.getByText('is on its way').waitFor();

    const reviewer = await arrive('Dee Reviewer');
    await reviewer.goto(await linkTo('dee@main-job.example', 'review'));
    await reviewer.getByRole('button', { name: 'Rerun every cell' }).click();
    await expect
      .poll(() => reviewer.locator('.contents .summary').innerText(), { timeout: 40_000 })
      .toBe('5 match');
    expect(await reviewer.locator('[contenteditable="true"]').count()).toBe(0);

    const refused = await reviewer.evaluate(async (notebook) => {
      const write = await fetch(`/api${notebook}/run`, { method: 'POST' });
      const closed = await new Promise<number>((resolve) => {
        const socket = new WebSocket(
          `${location.origin.replace('http', 'ws')}/live/${notebook.split('/').at(-1)}`,
        );
        socket.onopen = () => socket.send(new Uint8Array([0, 2, 2, 0, 0]));
        socket.onclose = (event) => resolve(event.code);
      });
      return { status: write.status, closed };
    }, address);
    expect(refused.status).toBeGreaterThanOrEqual(401);
    expect([4401, 4403]).toContain(refused.closed);

    const beside = reviewer.getByRole('region', { name: 'structure structure1' });
    await beside.getByRole('button', { name: 'Write a remark' }).click();
    await beside.getByLabel('Remark on structure1').fill('Which total was used?');
    await beside.getByRole('button', { name: 'Send the remark' }).click();
    await beside.getByText('Which total was used?').waitFor();

    await lead.goto(record);
    await lead.getByText('Which total was used?').waitFor();
  });

  test('a role taken away counts at once on an open page', async () => {
    await author.goto(address);
    await cell(author, 'network1').waitFor();
    await lead.goto('/groups');
    await lead.getByRole('link', { name: 'Main Job' }).click();
    await lead.getByRole('combobox', { name: 'Role of Ben Author' }).click();
    await lead.getByRole('option', { name: 'Reader' }).click();
    await expect
      .poll(() => author.locator('.cm-content[contenteditable="true"]').count(), { timeout: 30_000 })
      .toBe(0);
  });

  test('no page broke the content policy or threw', () => {
    expect([...browsing.people.values()].flatMap(({ troubles }) => troubles)).toEqual([]);
  });
});
