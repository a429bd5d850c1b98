import { type Complaint, readNetwork } from '@stillroom/shared/notation';
import type { ReadingQuestion } from './notationWorker.ts';

/** Up to so many lines are read within a frame. */
const fewLines = 40;

/** Whether a text may take longer to read than a frame lasts: some lines, or a family, which may stand for a million rows. */
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

interface Waiting {
  readonly text: string;
  readonly resolve: (found: readonly Complaint[]) => void;
}

let worker: Worker | null = null;
/** Whether no worker could be had, as behind a proxy that withholds it. */
let alone = false;
let asked = 0;
const waiting = new Map<number, Waiting>();

/** Reads here what no worker reads. */
function readHere(): void {
  for (const { text, resolve } of waiting.values()) resolve(readNetwork(text).complaints);
  waiting.clear();
}

function reader(): Worker {
  if (worker !== null) return worker;
  worker = new Worker(new URL('./notationWorker.ts', import.meta.url), { type: 'module' });
  worker.addEventListener('message', ({ data }: MessageEvent<Answer>) => {
    waiting.get(data.number)?.resolve(data.complaints);
    waiting.delete(data.number);
  });
  worker.addEventListener('error', () => {
    alone = true;
    readHere();
  });
  return worker;
}

/**
 * What is wrong or doubtful in a network's text: at once for a text that is read within a frame, else from a worker, so
 * that typing never waits for it.
 */
export function checkNotation(text: string): readonly Complaint[] | Promise<readonly Complaint[]> {
  if (alone || !isLong(text)) return readNetwork(text).complaints;
  return new Promise((resolve) => {
    asked += 1;
    waiting.set(asked, { text, resolve });
    reader().postMessage({ number: asked, text } satisfies ReadingQuestion);
  });
}
