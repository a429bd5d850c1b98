import { walkSyntax } from '../../expression/names.ts';
import type { ExpressionSyntax, RangeSyntax } from '../../expression/syntax.ts';
import type { FamilySyntax } from '../ast.ts';
import { Failure } from '../failure.ts';
import { compileInteger } from './integers.ts';
import type { IndexValues, IntegerFunction, IntegerNames, Slots } from './integers.ts';

/** A family may write this many reactions or values. */
export const FAMILY_LIMIT = 5_000_000;
/** Combinations of indices that are looked at while a `where` picks from them. */
const SEARCH_LIMIT = 50_000_000;

interface CompiledRange {
  readonly first: IntegerFunction;
  readonly last: IntegerFunction;
  /** Whether the bounds use no index before it. */
  readonly constant: boolean;
}

/** A family with its bounds made ready. */
export interface Family {
  readonly slots: Slots;
  /** Calls `visit` with the indices of every member, the last index running fastest. The array is reused. */
  forEach(visit: (values: IndexValues) => void): void;
}

const noSlots: Slots = new Map();
const noValues: IndexValues = [];
/** What is not in a family has one member without indices. */
const alone: Family = { slots: noSlots, forEach: (visit) => visit(noValues) };

/**
 * Makes a family ready. `perMember`: how many reactions or values each member writes. Throws Failure where a bound is
 * no integer or the family is too large; the size is known before anything is written.
 */
export function compileFamily(
  syntax: FamilySyntax | null,
  names: IntegerNames,
  perMember = 1,
  what = 'reactions',
): Family {
  if (!syntax) return alone;
  const { slots, ranges } = compileRanges(syntax.ranges, names);
  const where = syntax.where ? compileInteger(syntax.where, slots, names) : null;
  const size = countCombinations(ranges, syntax);
  if (!where) refuseLarge(size * perMember, syntax, what);
  return {
    slots,
    forEach: (visit) => {
      let members = 0;
      forEachCombination(ranges, (values) => {
        if (where) {
          if (where(values) === 0) return;
          members += 1;
          if (members * perMember > FAMILY_LIMIT) refuseLarge(members * perMember, syntax, what);
        }
        visit(values);
      });
    },
  };
}

/** Compiles ranges in order; a bound may use the indices before it. */
export function compileRanges(
  syntax: readonly RangeSyntax[],
  names: IntegerNames,
  outer: Slots = noSlots,
): { slots: Map<string, number>; ranges: CompiledRange[] } {
  const slots = new Map(outer);
  const ranges = syntax.map((range) => {
    const compiled = {
      first: compileInteger(range.first, slots, names),
      last: compileInteger(range.last, slots, names),
      constant: !usesAny(range.first, slots) && !usesAny(range.last, slots),
    };
    slots.set(range.name, slots.size);
    return compiled;
  });
  return { slots, ranges };
}

function usesAny(expression: ExpressionSyntax, slots: Slots): boolean {
  let found = false;
  walkSyntax(expression, (part) => (found ||= part.kind === 'name' && slots.has(part.name)));
  return found;
}

/** Runs over all combinations, from the slot after those of `start`. */
export function forEachCombination(
  ranges: readonly CompiledRange[],
  visit: (values: IndexValues) => void,
  start: IndexValues = [],
): void {
  const values = [...start];
  const run = (depth: number): void => {
    const range = ranges[depth];
    if (!range) {
      visit(values);
      return;
    }
    const first = range.first(values);
    const last = range.last(values);
    const slot = start.length + depth;
    for (let value = first; value <= last; value += 1) {
      values[slot] = value;
      run(depth + 1);
    }
  };
  run(0);
}

/** How many combinations there are; the last range is counted, not run. Throws Failure beyond the search limit. */
function countCombinations(ranges: readonly CompiledRange[], at: FamilySyntax): number {
  const last = ranges.at(-1);
  if (!last) return 1;
  const outer = ranges.slice(0, -1);
  const simple = sizeOfConstantRanges(ranges);
  if (simple !== null) return checkSearch(simple, at);
  let total = 0;
  let steps = 0;
  forEachCombination(outer, (values) => {
    steps += 1;
    total += Math.max(0, last.last(values) - last.first(values) + 1);
    if (steps > FAMILY_LIMIT) checkSearch(Infinity, at);
  });
  return checkSearch(total, at);
}

/** The size when no bound uses an index before it; null where one does. */
function sizeOfConstantRanges(ranges: readonly CompiledRange[]): number | null {
  let size = 1;
  for (const range of ranges) {
    if (!range.constant) return null;
    size *= Math.max(0, range.last(noValues) - range.first(noValues) + 1);
  }
  return size;
}

function checkSearch(size: number, at: FamilySyntax): number {
  if (size <= SEARCH_LIMIT) return size;
  const shown = Number.isFinite(size) ? inWords(size) : `more than ${inWords(SEARCH_LIMIT)}`;
  throw new Failure(
    at.from,
    at.to,
    `This family has ${shown} members; at most ${inWords(SEARCH_LIMIT)} can be looked at.`,
  );
}

function refuseLarge(size: number, at: FamilySyntax, what: string): void {
  if (size <= FAMILY_LIMIT) return;
  throw new Failure(
    at.from,
    at.to,
    `This family would write ${inWords(size)} ${what}; the limit is ${inWords(FAMILY_LIMIT)}.`,
    {
      hint: 'Make its ranges shorter.',
    },
  );
}

/** 10000000 as "10,000,000". */
function inWords(size: number): string {
  return String(size).replace(/\B(?=(\d{3})+$)/g, ',');
}
