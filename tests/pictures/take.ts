import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import type { Page } from 'playwright-core';
import { launchChromium } from '../support/chromium.ts';
import { settled, Stage } from './stage.ts';
import { stations } from './stations.ts';

/**
 * Takes a picture of every page and state of a running demonstration, at four widths and in both themes, for people to
 * look at; tells which pages are wider than the window and what went wrong on them. `npm run pictures -- shelf group`
 * takes those whose names hold one of the words.
 */
const { values, positionals } = parseArgs({
  allowPositionals: true,
  options: {
    at: { type: 'string', default: 'http://localhost:7070' },
    out: { type: 'string', default: '.build/pictures' },
    widths: { type: 'string', default: '1440,1024,768,390' },
    themes: { type: 'string', default: 'light,dark' },
  },
});
const heights: Readonly<Record<number, number>> = { 390: 844 };
const allWidths = values.widths.split(',').map(Number);
const themes = values.themes.split(',') as ('light' | 'dark')[];
const picked = stations.filter(
  ({ name }) => positionals.length === 0 || positionals.some((word) => name.includes(word)),
);

/** What sticks out to the right of the window, outermost first; empty where the page fits. */
const overflowOf = (page: Page): Promise<string[]> =>
  page.evaluate(() => {
    const room = document.documentElement.clientWidth;
    if (document.documentElement.scrollWidth <= room) return [];
    const wide = [...document.querySelectorAll('body *')].filter(
      (element) => element.getBoundingClientRect().right > room + 0.5,
    );
    return wide.slice(-4).map((element) => `${element.tagName.toLowerCase()}.${element.className}`);
  });

mkdirSync(values.out, { recursive: true });
const browser = await launchChromium();
const stage = new Stage(browser, values.at);
let wrong = 0;
function complain(words: string): undefined {
  wrong += 1;
  console.log(words);
}
try {
  for (const { name, who, show, print, widths = allWidths } of picked) {
    const opened = await stage.pageOf(who).catch((cause: unknown) => complain(`${name}: ${String(cause)}`));
    if (opened === undefined) continue;
    const { page, context, troubles } = opened;
    context.setDefaultTimeout(15_000);
    try {
      await page.setViewportSize({ width: 1440, height: 900 });
      const leave = await show(page, stage);
      if (print === true) {
        await settled(page, 'light');
        await page.pdf({
          path: join(values.out, `${name}.pdf`),
          preferCSSPageSize: true,
          printBackground: true,
        });
      } else {
        for (const width of widths.filter((one) => allWidths.includes(one))) {
          await page.setViewportSize({ width, height: heights[width] ?? 900 });
          for (const theme of themes) {
            await settled(page, theme);
            const path = join(values.out, `${name}-${width}-${theme}.png`);
            await page.screenshot({ path, fullPage: true });
          }
          const over = await overflowOf(page);
          if (over.length > 0) complain(`${name} at ${width} is wider than the window: ${over.join(', ')}`);
        }
      }
      await leave?.();
    } catch (cause) {
      complain(`${name}: ${cause instanceof Error ? (cause.message.split('\n')[0] ?? '') : String(cause)}`);
      await page.screenshot({ path: join(values.out, `${name}-lost.png`) }).catch(() => undefined);
      await stage.forget(who);
    }
    for (const trouble of troubles.splice(0)) complain(`${name}: ${trouble}`);
  }
} finally {
  await browser.close();
}
console.log(`${picked.length} stations, ${wrong} complaints; the pictures are in ${values.out}`);
