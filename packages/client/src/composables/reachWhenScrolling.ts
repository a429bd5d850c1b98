const mark = 'scrolls';
let observer: ResizeObserver | null = null;

function look(element: HTMLElement): void {
  // A pixel more or less is rounding, and nothing to scroll to.
  const scrolls =
    element.scrollWidth > element.clientWidth + 1 || element.scrollHeight > element.clientHeight + 1;
  if (scrolls) element.tabIndex = 0;
  else element.removeAttribute('tabindex');
}

/**
 * Lets a box with more in it than fits be scrolled by keyboard: it takes the focus while it scrolls, and is no stop of
 * its own while all of it is seen. Ends by itself when the element leaves the page.
 */
export function reachWhenScrolling(element: HTMLElement): void {
  if (typeof ResizeObserver === 'undefined') return;
  observer ??= new ResizeObserver((entries) => {
    for (const { target } of entries) {
      const box = target.closest<HTMLElement>(`[data-${mark}]`);
      if (box === null || !target.isConnected) observer?.unobserve(target);
      else look(box);
    }
  });
  element.dataset[mark] = '';
  observer.observe(element);
  for (const child of element.children) observer.observe(child);
}

/** The same as a directive: `v-reach`. */
export const vReach = { mounted: reachWhenScrolling };
