import type { GroupView } from '@stillroom/shared/contracts';
import type { APIResponse, BrowserContext, Page } from 'playwright-core';
import { beforeAll } from 'vitest';
import { demoPassword } from '../../packages/server/src/demo/people.ts';
import { useBrowsing } from './browsing.ts';
import { usualPassword } from './build.ts';
import { enter } from './chromium.ts';
import type { TestServer } from './server.ts';

/** One browser on the demo, in turn that of each of its people. */
export interface DemoBrowsing {
  readonly server: TestServer;
  readonly page: Page;
  readonly context: BrowserContext;
  /** Signs one of the demo's people in, by first name; who was signed in before no longer is. */
  as(name: string): Promise<void>;
  /** Signs in anybody else, with the usual password where none is given. */
  enter(email: string, password?: string): Promise<void>;
  ask<Answer>(path: string): Promise<Answer>;
  send(path: string, method: 'post' | 'put' | 'patch', data: unknown): Promise<APIResponse>;
  groupNamed(name: string): Promise<GroupView>;
  /** Where the newest letter to an address leads. */
  letterLink(path: string, email: string): Promise<string>;
}

/** Starts the demo and one browser before the tests of a file and stops them after. */
export function useDemo(): DemoBrowsing {
  const browsing = useBrowsing(() => Promise.resolve(), { DEMO: '1' });
  let page: Page;
  let context: BrowserContext;
  beforeAll(async () => {
    ({ page, context } = await browsing.open('visitor'));
  });
  const ask = async <Answer>(path: string): Promise<Answer> =>
    (await (await context.request.get(path)).json()) as Answer;
  return {
    get server() {
      return browsing.server;
    },
    get page() {
      return page;
    },
    get context() {
      return context;
    },
    as: (name) => {
      const house = name === 'orla' ? 'stillroom' : 'brewhouse-kinetics';
      return enter(context, browsing.server.url, `${name}@${house}.example`, demoPassword);
    },
    enter: (email, password = usualPassword) => enter(context, browsing.server.url, email, password),
    ask,
    send: (path, method, data) =>
      context.request[method](path, { data, headers: { origin: browsing.server.url } }),
    async groupNamed(name) {
      const groups = await ask<readonly { id: string; name: string }[]>('/api/groups');
      return ask(`/api/groups/${groups.find((group) => group.name === name)?.id}`);
    },
    async letterLink(path, email) {
      const [letter] = await browsing.server.sql<{ text: string }>(
        'select text from mail where recipient = $1 order by at desc limit 1',
        [email],
      );
      return new RegExp(`/${path}/[\\w-]+`, 'u').exec(letter?.text ?? '')?.[0] ?? `no letter to ${email}`;
    },
  };
}
