import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, beforeEach } from 'vitest';
import { usualPassword } from './build.ts';
import { enter, launchChromium, openPage, pictureOnFailure, type WatchedPage } from './chromium.ts';
import { startTestServer, type TestServer } from './server.ts';

/** How long a browser waits for what the engine or another process has to do first. */
export const patience = { timeout: 60_000 };

/** A server and a browser for the tests of one file. */
export interface Browsing {
  readonly server: TestServer;
  /** Everybody's page, by name. */
  readonly people: ReadonlyMap<string, WatchedPage>;
  /** A fresh browser, with its own cookies and storage. */
  open(name: string, options?: { at?: string; width?: number; height?: number }): Promise<WatchedPage>;
  /** The same for somebody with the usual password who is signed in already. */
  enter(email: string, options?: { at?: string }): Promise<WatchedPage>;
}

/**
 * Starts a server and a browser before the tests of a file and stops them after; `prepare` builds what the tests need.
 * When a test fails, a picture is left of every open page.
 */
export function useBrowsing(
  prepare: (server: TestServer) => Promise<unknown>,
  settings: Readonly<Record<string, string>> = {},
): Browsing {
  const people = new Map<string, WatchedPage>();
  let server: TestServer;
  let browser: Browser;
  beforeAll(async () => {
    server = await startTestServer(settings);
    await prepare(server);
    browser = await launchChromium();
  }, 180_000);
  beforeEach((running) => pictureOnFailure(running, people));
  afterAll(async () => {
    await browser.close();
    await server.stop();
  });
  return {
    get server() {
      return server;
    },
    people,
    async open(name, { at = server.url, ...size } = {}) {
      const watched = await openPage(browser, at, size);
      people.set(people.has(name) ? `${name} ${people.size}` : name, watched);
      return watched;
    },
    async enter(email, { at = server.url } = {}) {
      const watched = await this.open(email, { at });
      await enter(watched.context, at, email, usualPassword);
      return watched;
    },
  };
}

/** A cell of an open notebook, by its name. */
export const cellNamed = (page: Page, name: string) =>
  page.getByRole('region', { name: new RegExp(`\\b${name}, `, 'u') });

/** Waits until words stand on a page. */
export const words = (page: Page, text: string | RegExp) => page.getByText(text).first().waitFor(patience);
