import { type Complaint, readNetwork } from '@stillroom/shared/notation';
import type { ReadingQuestion } from './notationWorker.ts';

/** Up to so many lines are read between two frames. */
const fewLines = 4000;

/** Whether a text may take long to read: many lines, or a family, which may stand for a million rows. */
export function isLong(text: string): boolean {
  if (text.includes('..')) return true;
  let lines = 1;
  for (let at = text.indexOf('\n'); at >= 0; at = text.indexOf('\n', at + 1)) lines += 1;
  return lines > fewLines;
}

interface Answer {
  readonly number: number;
  readonly complaints: readonly Complaint[];
}

let worker: Worker | null = null;
let asked = 0;
const waiting = new Map<number, (found: readonly Complaint[]) => void>();

function reader(): Worker {
  if (worker !== null) return worker;
  worker = new Worker(new URL('./notationWorker.ts', import.meta.url), { type: 'module' });
  worker.addEventListener('message', ({ data }: MessageEvent<Answer>) => {
    waiting.get(data.number)?.(data.complaints);
    waiting.delete(data.number);
  });
  return worker;
}

/**
 * What is wrong or doubtful in a network's text: at once for a text that is read between two frames, else from a worker,
 * so that typing never waits for it.
 */
export function checkNotation(text: string): readonly Complaint[] | Promise<readonly Complaint[]> {
  if (!isLong(text)) return readNetwork(text).complaints;
  return new Promise((resolve) => {
    asked += 1;
    waiting.set(asked, resolve);
    reader().postMessage({ number: asked, text } satisfies ReadingQuestion);
  });
}
