import type { OutboxMail, ShownLetter } from '@stillroom/shared/contracts';
import type { NotebookFile } from '@stillroom/shared/notebook-file';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { demoPassword } from '../../packages/server/src/demo/people.ts';
import { enter, openPage, type WatchedPage } from '../support/chromium.ts';

/** Who looks: a person of the demonstration by the first part of the address, a newcomer, or nobody. */
export type Who = 'ilse' | 'dov' | 'nadia' | 'rurik' | 'tamsin' | 'orla' | 'newcomer' | 'nobody';

const addresses: Readonly<Record<Exclude<Who, 'nobody' | 'newcomer'>, string>> = {
  ilse: 'ilse@brewhouse-kinetics.example',
  dov: 'dov@brewhouse-kinetics.example',
  nadia: 'nadia@brewhouse-kinetics.example',
  rurik: 'rurik@tidewater.example',
  tamsin: 'tamsin@maltings.example',
  orla: 'orla@stillroom.example',
};

/** A running demonstration with a browser in front of it; one person looks at a time. */
export class Stage {
  readonly #browser: Browser;
  readonly #address: string;
  readonly #people = new Map<Who, WatchedPage>();

  constructor(browser: Browser, address: string) {
    this.#browser = browser;
    this.#address = address;
  }

  /** That person's page, signed in; the same one each time. */
  async pageOf(who: Who): Promise<WatchedPage> {
    const there = this.#people.get(who);
    if (there !== undefined) return there;
    const opened = await openPage(this.#browser, this.#address);
    this.#people.set(who, opened);
    if (who === 'newcomer') await this.#signUp(opened.context);
    else if (who !== 'nobody') await enter(opened.context, this.#address, addresses[who], demoPassword);
    return opened;
  }

  /** Closes a person's page, so that the next one opens afresh. */
  async forget(who: Who): Promise<void> {
    await this.#people.get(who)?.context.close();
    this.#people.delete(who);
  }

  /** Asks an address of the server as that person. */
  async ask<Answer>(who: Who, path: string): Promise<Answer> {
    const { context } = await this.pageOf(who);
    return (await (await context.request.get(path)).json()) as Answer;
  }

  /** Sends to an address of the server as that person. */
  async send<Answer>(
    who: Who,
    method: 'POST' | 'PUT' | 'PATCH' | 'DELETE',
    path: string,
    data?: unknown,
  ): Promise<Answer> {
    const { context } = await this.pageOf(who);
    const answer = await context.request.fetch(path, { method, data, headers: { origin: this.#address } });
    const text = await answer.text();
    if (!answer.ok()) throw new Error(`${method} ${path}: ${text}`);
    return (text === '' ? undefined : JSON.parse(text)) as Answer;
  }

  async groupNamed(who: Who, name: string): Promise<string> {
    const groups = await this.ask<readonly { id: string; name: string }[]>(who, '/api/groups');
    const group = groups.find((one) => one.name === name);
    if (group === undefined) throw new Error(`${who} is in no group called ${name}.`);
    return group.id;
  }

  /** The id of a notebook by how its title begins. */
  async notebookNamed(who: Who, title: string): Promise<string> {
    const { notebooks } = await this.ask<{ notebooks: readonly { id: string; title: string }[] }>(
      who,
      '/api/shelf',
    );
    const notebook = notebooks.find((one) => one.title.startsWith(title));
    if (notebook === undefined) throw new Error(`${who} has no notebook called ${title}.`);
    return notebook.id;
  }

  /** Sews a notebook with these cells into a group. @returns its id */
  async bringIn(
    who: Who,
    group: string,
    title: string,
    cells: readonly Partial<NotebookFile['cells'][number]>[],
  ) {
    const file = { format: 'stillroom-notebook/1', title, subject: 'none', cells };
    const { id } = await this.send<{ id: string }>(who, 'POST', `/api/groups/${group}/notebook-files`, file);
    return id;
  }

  /** The path of the newest link of a kind in a letter to somebody. */
  async letterLink(kind: string, to: string): Promise<string> {
    const mails = await this.ask<readonly OutboxMail[]>('orla', '/api/operator/outbox');
    for (const mail of mails.filter((one) => one.to === to && one.sealed === 'on request')) {
      const { text } = await this.send<ShownLetter>(
        'orla',
        'POST',
        `/api/operator/outbox/${mail.id}/showing`,
        {},
      );
      const path = new RegExp(`/${kind}/[\\w-]+`, 'u').exec(text)?.[0];
      if (path !== undefined) return path;
    }
    throw new Error(`No letter to ${to} has a link to /${kind}.`);
  }

  /** Somebody who signed up and confirmed the address; made once for an installation. */
  async #signUp(context: BrowserContext): Promise<void> {
    const email = 'newcomer@example.org';
    const password = 'the newcomer’s password';
    const headers = { origin: this.#address };
    const there = await context.request.post('/api/session', { data: { email, password }, headers });
    if (there.ok()) return;
    await this.send('orla', 'PATCH', '/api/operator/settings', { signUp: 'open' });
    const data = { email, name: 'Pell Arden', password };
    const made = await context.request.post('/api/accounts', { data, headers });
    if (!made.ok()) throw new Error(`The newcomer could not sign up: ${await made.text()}`);
    const token = (await this.letterLink('confirm', email)).split('/').at(-1);
    await context.request.post('/api/accounts/confirm', { data: { token }, headers });
    await enter(context, this.#address, email, password);
  }
}

/** Shows the page in a theme and waits until nothing on it moves or is waited for. */
export async function settled(page: Page, theme: 'light' | 'dark'): Promise<void> {
  await page.emulateMedia({ colorScheme: theme, reducedMotion: 'reduce' });
  await page.waitForLoadState('networkidle', { timeout: 3000 }).catch(() => undefined);
  await page.waitForFunction(
    (dark) => document.documentElement.classList.contains('dark') === dark,
    theme === 'dark',
  );
  await page.evaluate(async () => {
    await document.fonts.ready;
    // Transitions begin with the frame after the class has changed.
    await new Promise((resolve) => requestAnimationFrame(() => requestAnimationFrame(resolve)));
  });
  await page.waitForFunction(() =>
    document.getAnimations().every((one) => !(one instanceof CSSTransition) || one.playState !== 'running'),
  );
}
