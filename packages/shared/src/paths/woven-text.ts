import { type NumberStyle, numberText, unitText } from './number-text.ts';
import { reduceNumbers, valueAt } from './reduce.ts';
import type { WovenFilter } from './woven.ts';

/** A woven value as it reads in a sentence, or why it cannot. */
export type WovenText =
  | { readonly ok: true; readonly text: string }
  | { readonly ok: false; readonly message: string; readonly hint: string | null };

/** What surrounds a value in its result. */
export interface WovenContext {
  /** The times of the course it belongs to, for `at`. */
  readonly times: readonly number[] | null;
  readonly unit: string | null;
}

class Unweavable extends Error {
  readonly hint: string | null;
  constructor(message: string, hint: string | null = null) {
    super(message);
    this.hint = hint;
  }
}

/** A number of a result: a JSON number, or an exact one as text. */
function numberOf(value: unknown): number | null {
  if (typeof value === 'number') return value;
  if (typeof value !== 'string') return null;
  const parts = /^(-?\d+)(?:\/(\d+))?$/u.exec(value);
  return parts === null ? null : Number(parts[1]) / Number(parts[2] ?? 1);
}

function numbersOf(value: unknown, filter: string): number[] {
  if (!Array.isArray(value)) {
    throw new Unweavable(`"${filter}" needs a list, and this is a single value.`, `Leave "${filter}" out.`);
  }
  if (value.length === 0) throw new Unweavable('This list is empty.');
  return value.map((entry) => {
    const number = numberOf(entry);
    if (number === null)
      throw new Unweavable(`"${filter}" needs a list of numbers, and this one holds other things.`);
    return number;
  });
}

function atTime(value: unknown, time: number, times: readonly number[] | null): number {
  const values = numbersOf(value, 'at');
  if (times === null || times.length !== values.length) {
    throw new Unweavable('"at" needs a course in time, and this list is none.');
  }
  const found = valueAt(times, values, time);
  if (found === null) {
    throw new Unweavable(
      `The course runs from ${times[0]} to ${times.at(-1)}, so it has no value at ${time}.`,
    );
  }
  return found;
}

/** The list filters: what is left is a single value. */
function reduced(value: unknown, filter: WovenFilter, context: WovenContext): unknown {
  switch (filter.kind) {
    case 'first':
    case 'last':
      if (!Array.isArray(value) || value.length === 0) return numbersOf(value, filter.kind)[0];
      return filter.kind === 'first' ? value[0] : value.at(-1);
    case 'mean':
    case 'sd':
    case 'min':
    case 'max':
      return reduceNumbers(filter.kind, numbersOf(value, filter.kind));
    case 'at':
      return atTime(value, filter.time, context.times);
    default:
      return value;
  }
}

function styleOf(filters: readonly WovenFilter[]): NumberStyle {
  let style: NumberStyle = {};
  for (const filter of filters) {
    if (filter.kind === 'digits') style = { ...style, digits: filter.count };
    else if (filter.kind === 'decimals') style = { ...style, decimals: filter.count };
    else if (filter.kind === 'scientific') style = { ...style, scientific: true };
  }
  return style;
}

function textOf(value: unknown, filters: readonly WovenFilter[], context: WovenContext): string {
  const shaped = filters.some(({ kind }) => ['digits', 'decimals', 'scientific', 'percent'].includes(kind));
  const unit = filters.some(({ kind }) => kind === 'unit') && context.unit !== null;
  const after = unit ? `\u00A0${unitText(context.unit ?? '')}` : '';
  if (value === null) return 'undecided';
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (Array.isArray(value)) {
    throw new Unweavable(
      `This is a list of ${value.length}; a sentence takes one value.`,
      'Add one of first, last, at T, mean, sd, min, max.',
    );
  }
  const number = typeof value === 'number' || shaped ? numberOf(value) : null;
  if (number !== null) {
    const percent = filters.some(({ kind }) => kind === 'percent');
    return `${numberText(percent ? number * 100 : number, styleOf(filters))}${percent ? '\u00A0%' : after}`;
  }
  if (typeof value === 'string') {
    if (shaped) throw new Unweavable(`"${value}" is no number, so it cannot be shown in digits.`);
    return `${value.replace(/^-(?=\d)/u, '−')}${after}`;
  }
  const keys = Object.keys(value as object).slice(0, 8);
  throw new Unweavable('This holds several values; a sentence takes one.', `It has ${keys.join(', ')}.`);
}

/** Sets a value found in a result as words, the way its filters say. Never throws. */
export function wovenText(value: unknown, filters: readonly WovenFilter[], context: WovenContext): WovenText {
  try {
    const single = filters.reduce((left, filter) => reduced(left, filter, context), value);
    return { ok: true, text: textOf(single, filters, context) };
  } catch (error) {
    if (error instanceof Unweavable) return { ok: false, message: error.message, hint: error.hint };
    throw error;
  }
}
