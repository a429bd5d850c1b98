/*
 * What typing and scrolling cost a page: the tasks of its main thread as Chromium itself notes them, and the frames that
 * came late. Processor time is what the page is answerable for; wall time also holds what others take on a busy machine.
 */
import type { CDPSession, Page } from 'playwright-core';

/** A task of the main thread, in milliseconds. */
export interface Task {
  readonly at: number;
  readonly wall: number;
  readonly cpu: number;
}

/** An event of a trace, in microseconds; `tdur` is processor time. */
export interface TraceEvent {
  readonly name: string;
  readonly ph: string;
  readonly ts: number;
  readonly dur?: number;
  readonly tdur?: number;
  readonly pid: number;
  readonly tid: number;
  readonly args?: { readonly data?: Readonly<Record<string, unknown>> };
}

export interface Frames {
  readonly tasks: readonly Task[];
  /** Milliseconds between frames. */
  readonly gaps: readonly number[];
  /** Everything that the main thread noted, for looking closer. */
  readonly events: readonly TraceEvent[];
}

const categories = [
  'devtools.timeline',
  'disabled-by-default-devtools.timeline',
  'toplevel',
  'blink.user_timing',
];

/** Notes what the main thread of a page does while `work` goes on. */
export async function framesDuring(page: Page, work: () => Promise<void>): Promise<Frames> {
  const session: CDPSession = await page.context().newCDPSession(page);
  const events: TraceEvent[] = [];
  session.on('Tracing.dataCollected', ({ value }) => events.push(...(value as unknown as TraceEvent[])));
  await session.send('Tracing.start', {
    transferMode: 'ReportEvents',
    traceConfig: { includedCategories: categories },
  });
  await page.evaluate(() => {
    performance.mark('measured page');
    // A method, since a named function would need a helper that the page does not have.
    const noted = {
      gaps: [] as number[],
      last: 0,
      ticking: 0,
      tick(now: number) {
        if (noted.last > 0) noted.gaps.push(now - noted.last);
        noted.last = now;
        noted.ticking = requestAnimationFrame(noted.tick);
      },
    };
    noted.ticking = requestAnimationFrame(noted.tick);
    Object.assign(window, { noted });
  });
  await work();
  const gaps = await page.evaluate(() => {
    const { noted } = window as unknown as { noted: { gaps: number[]; ticking: number } };
    cancelAnimationFrame(noted.ticking);
    return noted.gaps;
  });
  const complete = new Promise<void>((resolve) => session.once('Tracing.tracingComplete', () => resolve()));
  await session.send('Tracing.end');
  await complete;
  await session.detach();
  const mark = events.find(({ name }) => name === 'measured page');
  const own = events.filter(({ pid, tid }) => pid === mark?.pid && tid === mark.tid);
  return { tasks: tasksOf(own), gaps, events: own };
}

function tasksOf(events: readonly TraceEvent[]): Task[] {
  return events
    .filter(({ name, ph }) => ph === 'X' && name === 'RunTask')
    .map(({ ts, dur = 0, tdur = 0 }) => ({ at: ts / 1000, wall: dur / 1000, cpu: tdur / 1000 }));
}

/** Types at the pace of a quick hand: some eight keys a second. */
export async function typeText(page: Page, text: string): Promise<void> {
  for (const letter of text) {
    await page.keyboard.press(letter === ' ' ? 'Space' : letter);
    await page.waitForTimeout(110);
  }
}

/** Turns the wheel a little every frame, down a page and up again. */
export async function scrollThrough(page: Page, length: number): Promise<void> {
  for (const step of [60, -60])
    for (let way = 0; way < length; way += Math.abs(step)) {
      await page.mouse.wheel(0, step);
      await page.waitForTimeout(16);
    }
}
