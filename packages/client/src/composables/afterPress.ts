/** Whether a button of the pointer is down, and what waits for it to come up. */
let pressed = false;
let waiting: (() => void)[] = [];

function release(): void {
  pressed = false;
  const ready = waiting;
  waiting = [];
  // After the click that follows: it must find the page as it was when the button went down.
  if (ready.length > 0) setTimeout(() => ready.forEach((run) => run()), 0);
}

if (typeof document !== 'undefined') {
  addEventListener('pointerdown', () => (pressed = true), true);
  addEventListener('pointerup', release, true);
  addEventListener('pointercancel', release, true);
  addEventListener('blur', release);
}

/**
 * Does at once what may move the page, unless a button of the pointer is down: then after the click, so that nothing passes
 * beneath the pointer and a click selects what it was meant for.
 */
export function afterPress(run: () => void): void {
  if (pressed) waiting.push(run);
  else run();
}
