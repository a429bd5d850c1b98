import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { type Browser, type BrowserContext, chromium, type Page } from 'playwright-core';
import type { TestContext } from 'vitest';

const executable = ['/usr/bin/chromium', '/usr/bin/chromium-browser'].find((path) => existsSync(path));

/** A headless Chromium from Debian's package. The caller closes it. */
export function launchChromium(): Promise<Browser> {
  if (executable === undefined) {
    throw new Error('Chromium is not installed: `npm test` installs it, or apt-get install chromium.');
  }
  return chromium.launch({
    executablePath: executable,
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  });
}

/** A page with what went wrong on it: content-policy violations, uncaught errors, failed requests of our own. */
export interface WatchedPage {
  readonly page: Page;
  readonly context: BrowserContext;
  readonly troubles: string[];
}

/** A fresh person's browser (own cookies and storage) with one page, watched. */
export async function openPage(
  browser: Browser,
  address: string,
  options: { width?: number; height?: number; dark?: boolean } = {},
): Promise<WatchedPage> {
  const context = await browser.newContext({
    baseURL: address,
    viewport: { width: options.width ?? 1440, height: options.height ?? 900 },
    colorScheme: options.dark === true ? 'dark' : 'light',
    reducedMotion: 'reduce',
  });
  const page = await context.newPage();
  const troubles: string[] = [];
  await page.addInitScript(() => {
    addEventListener('securitypolicyviolation', (event) => {
      reportError(
        new Error(`content policy: ${event.violatedDirective} ${event.blockedURI} ${event.sourceFile ?? ''}`),
      );
    });
  });
  page.on('pageerror', (error) => troubles.push(`error on ${page.url()}: ${error.message}`));
  page.on('console', (message) => {
    const text = message.text();
    if (/content policy|Content.Security.Policy/i.test(text)) troubles.push(`${page.url()}: ${text}`);
  });
  page.on('response', (response) => {
    if (response.status() >= 500) troubles.push(`${response.status()} ${response.url()}`);
  });
  return { page, context, troubles };
}

/** Signs a person in through the sign-in page. */
export async function signIn(page: Page, email: string, password: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('Email').fill(email);
  await page.locator('#password').fill(password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL((url) => url.pathname !== '/sign-in');
}

/** Makes a context that person's: signed in by a request, without the page. Who was signed in before no longer is. */
export async function enter(
  context: BrowserContext,
  address: string,
  email: string,
  password: string,
): Promise<void> {
  await context.clearCookies();
  const answer = await context.request.post('/api/session', {
    data: { email, password },
    headers: { origin: address },
  });
  if (!answer.ok()) throw new Error(`Signing in as ${email} failed: ${await answer.text()}`);
}

const pictures = fileURLToPath(new URL('../browser/pictures/', import.meta.url));

/** Leaves a picture of every open page when the test fails, by test and person. */
export function pictureOnFailure(context: TestContext, people: ReadonlyMap<string, WatchedPage>): void {
  context.onTestFailed(async () => {
    for (const [name, { page }] of people) {
      const file = `${context.task.name} ${name}`.replaceAll(/[^\w]+/g, '-').slice(0, 90);
      await page.screenshot({ path: `${pictures}${file}.png` }).catch(() => undefined);
    }
  });
}
