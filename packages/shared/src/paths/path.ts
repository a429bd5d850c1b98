import { MisreadError, type Reading, reading } from './reading.ts';

export type PathStep = string | number;

/** A place in the result of a cell: `run1.species["X[3]"]` has the head `run1` and the steps `species`, `X[3]`. */
export interface Path {
  readonly head: string;
  readonly steps: readonly PathStep[];
  /** Offsets in the text it was read from. */
  readonly from: number;
  readonly to: number;
}

const word = /[\p{L}_][\p{L}\p{M}\p{N}_']*/uy;
const index = /\[\s*(\d{1,9})\s*\]/uy;
const key = /\[\s*("(?:[^"\\\n]|\\.)*")\s*\]/uy;

function matchAt(pattern: RegExp, text: string, at: number): RegExpExecArray | null {
  pattern.lastIndex = at;
  return pattern.exec(text);
}

function keyText(literal: string, at: number): string {
  try {
    return (JSON.parse(literal) as string).normalize('NFC');
  } catch {
    throw new MisreadError(`${literal} is not a quoted name.`, at, 'Inside quotes write \\" for a quote.');
  }
}

/** Reads the steps that follow at `at`: `.name`, `[3]` and `["any text"]`. */
function readSteps(text: string, at: number): { steps: PathStep[]; to: number } {
  const steps: PathStep[] = [];
  for (;;) {
    const next = text[at];
    if (next === '.') {
      const name = matchAt(word, text, at + 1);
      if (name === null) {
        throw new MisreadError(
          'A name is missing after the dot.',
          at + 1,
          'A path looks like run1.species.P.',
        );
      }
      steps.push(name[0].normalize('NFC'));
      at += 1 + name[0].length;
    } else if (next === '[') {
      const number = matchAt(index, text, at);
      const quoted = number === null ? matchAt(key, text, at) : null;
      if (number !== null) steps.push(Number(number[1]));
      else if (quoted !== null) steps.push(keyText(quoted[1] ?? '', at));
      else {
        throw new MisreadError(
          'In brackets stands a number, counted from 0, or a name in quotes.',
          at,
          'An indexed species is written run1.species["X[3]"].',
        );
      }
      at += (number ?? quoted)?.[0].length ?? 0;
    } else {
      return { steps, to: at };
    }
  }
}

/**
 * Reads the path that begins at `from` and may be followed by more text.
 *
 * @throws MisreadError where no path begins there
 */
export function readPathAt(text: string, from: number): Path {
  const head = matchAt(word, text, from);
  if (head === null) {
    throw new MisreadError('The name of a cell is expected here.', from, 'A path looks like run1.species.P.');
  }
  const { steps, to } = readSteps(text, from + head[0].length);
  return { head: head[0].normalize('NFC'), steps, from, to };
}

/** Reads a whole text as one path. */
export function parsePath(text: string): Reading<Path> {
  return reading(() => {
    const from = text.length - text.trimStart().length;
    const path = readPathAt(text, from);
    if (text.slice(path.to).trim() !== '') {
      throw new MisreadError(`"${text.slice(path.to).trim()}" does not belong to a path.`, path.to);
    }
    return path;
  });
}

const plainStep = /^[\p{L}_][\p{L}\p{M}\p{N}_']*$/u;

/** A path as text; the first step is the head. The inverse of `parsePath`. */
export function printPath(head: string, steps: readonly PathStep[]): string {
  return steps.reduce<string>((text, step) => {
    if (typeof step === 'number') return `${text}[${step}]`;
    return plainStep.test(step) ? `${text}.${step}` : `${text}[${JSON.stringify(step)}]`;
  }, head);
}
