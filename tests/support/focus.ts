import type { Page } from 'playwright-core';

/** What holds the focus, and why it could not be seen there; null when it can. */
export interface Focus {
  /** "button Freeze a record…" */
  readonly what: string;
  readonly hidden: string | null;
}

/** Looks at the element with the focus as a person at the keyboard does: is it in sight, uncovered, and marked? */
export function focusOn(page: Page): Promise<Focus> {
  return page.evaluate(() => {
    const element = document.activeElement;
    if (!(element instanceof HTMLElement) || element === document.body)
      return { what: 'the page itself', hidden: null };
    const labels = (element as Partial<HTMLInputElement>).labels ?? null;
    const named =
      element.getAttribute('aria-label') ??
      (labels?.length ? labels[0]?.textContent : null) ??
      (element.innerText || element.title);
    const what = `${element.getAttribute('role') ?? element.tagName.toLowerCase()} ${named.replace(/\s+/gu, ' ').trim()}`;

    const box = element.getBoundingClientRect();
    const left = Math.max(box.left, 0);
    const right = Math.min(box.right, innerWidth);
    const top = Math.max(box.top, 0);
    const bottom = Math.min(box.bottom, innerHeight);
    if (right <= left || bottom <= top) return { what, hidden: 'it is out of sight' };
    const points = [0.5, 0.1, 0.9].flatMap((x) => [0.5, 0.15, 0.85].map((y) => [x, y] as const));
    const seen = points.some(([x, y]) => {
      const over = document.elementFromPoint(left + x * (right - left), top + y * (bottom - top));
      return over !== null && (element.contains(over) || over.contains(element));
    });
    if (!seen) return { what, hidden: 'something lies over it' };

    // A field is marked by its frame, a text by its caret.
    if (element.isContentEditable) return { what, hidden: null };
    const marked = [element, element.closest('.fld, .p-select, .p-multiselect, .p-password')].some((part) => {
      if (part === null) return false;
      const style = getComputedStyle(part);
      const outlined = style.outlineStyle !== 'none' && parseFloat(style.outlineWidth) > 0;
      return outlined || style.boxShadow !== 'none';
    });
    return { what, hidden: marked ? null : 'nothing marks it' };
  });
}

/** Presses a key until the focus is where it is wanted; every stop on the way must be one that can be seen. */
export async function pressUntil(page: Page, key: string, wanted: RegExp, atMost = 80): Promise<void> {
  const stops: string[] = [];
  for (let i = 0; i < atMost; i++) {
    await page.keyboard.press(key);
    const { what, hidden } = await focusOn(page);
    if (hidden !== null) throw new Error(`The focus on ${what} cannot be seen: ${hidden}.`);
    stops.push(what);
    if (wanted.test(what)) return;
  }
  throw new Error(`${key} never came to ${String(wanted)}; it came to: ${stops.join(' > ')}`);
}
