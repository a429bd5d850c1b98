import { nextTick, onScopeDispose } from 'vue';
import { sinceLastKey } from './typing.ts';

/** Milliseconds of drawing above which news waits for a rest in one's typing: half a frame. */
const costly = 8;
/** Milliseconds without a key that are a rest. */
const rest = 180;
/** News waits at most so many times as long as drawing takes: what is drawn while one types on takes that share of the time. */
const share = 60;

export interface Pace {
  /** Has news drawn: at once, or where drawing took long the last time, as soon as one rests from typing. */
  take(news: () => void): void;
}

/**
 * Lets typing go first. What a key of one's own changes elsewhere on the page is drawn between keys and not in the middle
 * of them, once it has been seen to cost more than half a frame; on the page of somebody who only watches it never waits.
 */
export function usePace(): Pace {
  let cost = 0;
  let waiting: (() => void)[] = [];
  let since = 0;
  let timer: ReturnType<typeof setTimeout> | undefined;

  /** How long scripts, styles, layout and paint take after a change of state, without the waiting for the frame. */
  async function measure(began: number): Promise<void> {
    await nextTick();
    const scripts = performance.now() - began;
    requestAnimationFrame((frame) => {
      const { port1, port2 } = new MessageChannel();
      const rendering = Math.max(frame, performance.now());
      // Comes behind the rendering of this frame.
      port1.onmessage = () => {
        cost = scripts + performance.now() - rendering;
        port1.close();
      };
      port2.postMessage(null);
    });
  }

  function draw(): void {
    clearTimeout(timer);
    timer = undefined;
    const news = waiting;
    waiting = [];
    const began = performance.now();
    for (const one of news) one();
    void measure(began);
  }

  function look(): void {
    const wait = Math.min(rest - sinceLastKey(), since + share * cost - performance.now());
    if (wait <= 0) draw();
    else timer = setTimeout(look, wait);
  }

  onScopeDispose(() => clearTimeout(timer));

  return {
    take(news) {
      waiting.push(news);
      if (timer !== undefined) return;
      since = performance.now();
      if (cost > costly) look();
      else draw();
    },
  };
}
