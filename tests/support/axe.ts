import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { AxeResults, RunOptions } from 'axe-core';
import type { Page } from 'playwright-core';

const source = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
const options: RunOptions = {
  runOnly: { type: 'tag', values: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'] },
  resultTypes: ['violations'],
};

/**
 * Each violation of WCAG 2.2 A and AA that axe finds on a page as it stands, or within one part of it: rule, place and
 * what is wrong.
 */
export async function violationsOn(page: Page, within = 'html'): Promise<string[]> {
  // Evaluated from outside: the content policy forbids the page itself a script that is not ours.
  if (!(await page.evaluate(() => 'axe' in window))) await page.evaluate(source);
  const { violations } = await page.evaluate(
    async ([part, asked]) => {
      const { axe } = window as unknown as {
        axe: { run(part: string, asked: RunOptions): Promise<AxeResults> };
      };
      return axe.run(part, asked);
    },
    [within, options] as const,
  );
  return violations.flatMap(({ id, nodes }) =>
    nodes.map(({ target, failureSummary }) => `${id} ${target.join(' ')}: ${failureSummary ?? ''}`),
  );
}

/** The same in both themes, which follow the machine's own while nobody chose one. */
export async function violationsInBothThemes(page: Page, within?: string): Promise<string[]> {
  const found: string[] = [];
  for (const colorScheme of ['dark', 'light'] as const) {
    await page.emulateMedia({ colorScheme, reducedMotion: 'reduce' });
    await page.waitForFunction(
      (dark) => document.documentElement.classList.contains('dark') === dark,
      colorScheme === 'dark',
    );
    // Colours change over 120 ms; what is half way has no colour of its own yet. A caret blinks for ever.
    await page.waitForFunction(() =>
      document.getAnimations().every((one) => !(one instanceof CSSTransition) || one.playState !== 'running'),
    );
    found.push(...(await violationsOn(page, within)).map((violation) => `${colorScheme}: ${violation}`));
  }
  return found;
}
