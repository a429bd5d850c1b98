import type { CellKind, ClaimSide } from '@stillroom/shared/cells';
import { isMeasuredPlace, numberText, type PathStep } from '@stillroom/shared/paths';
import {
  equals,
  formatRational,
  parseRational,
  type Rational,
  rationalForResult,
  toDouble,
} from '../exact/index.ts';

/** A value while a claim is worked out. Exact and measured numbers never mix unnoticed. */
export type ClaimValue =
  | { readonly kind: 'exact'; readonly value: Rational }
  | { readonly kind: 'measured'; readonly value: number }
  | { readonly kind: 'word'; readonly text: string }
  | { readonly kind: 'truth'; readonly value: boolean }
  | {
      readonly kind: 'list';
      readonly entries: readonly ClaimValue[];
      readonly times: readonly number[] | null;
    };

/** Thrown where a claim can neither hold nor fail: a value is not known. */
export class Undecided extends Error {}

/** Thrown where a claim does not make sense as written; `from` is an offset in its text, where there is one. */
export class ClaimMistake extends Error {
  readonly from: number | null;
  readonly hint: string | null;
  constructor(message: string, from: number | null = null, hint: string | null = null) {
    super(message);
    this.from = from;
    this.hint = hint;
  }
}

const exactPattern = /^-?\d+(?:\/\d+)?$/u;

/**
 * What a JSON value of a result means in a claim. Whole numbers and texts like "3/2" are exact unless they stand at a
 * measured place; numbers of a network are the decimals that its text says.
 *
 * @param spelt how the text spells the place, for the words
 */
export function claimValue(
  value: unknown,
  kind: CellKind,
  steps: readonly PathStep[],
  spelt: string,
): ClaimValue {
  const convert = (inner: unknown): ClaimValue => {
    switch (typeof inner) {
      case 'number': {
        const exact = !isMeasuredPlace(kind, steps) && (kind === 'network' || Number.isSafeInteger(inner));
        const value = exact ? parseRational(String(inner)) : null;
        return value === null ? { kind: 'measured', value: inner } : { kind: 'exact', value };
      }
      case 'string': {
        const value = exactPattern.test(inner) ? parseRational(inner) : null;
        return value === null ? { kind: 'word', text: inner } : { kind: 'exact', value };
      }
      case 'boolean':
        return { kind: 'truth', value: inner };
      default:
        if (inner === null) throw new Undecided(`${spelt} is not decided.`);
        if (Array.isArray(inner)) return { kind: 'list', entries: inner.map(convert), times: null };
        throw new ClaimMistake(
          `${spelt} holds several values; a claim compares single ones.`,
          null,
          `It has ${Object.keys(inner as object)
            .slice(0, 8)
            .join(', ')}.`,
        );
    }
  };
  return convert(value);
}

/**
 * A value as results carry it; lists have none.
 *
 * @param exactly false for a side of a comparison with a measured number: then both are doubles
 */
export function sideOf(value: ClaimValue, exactly = true): ClaimSide {
  switch (value.kind) {
    case 'exact':
      return exactly ? rationalForResult(value.value) : toDouble(value.value);
    case 'word':
      return value.text;
    case 'truth':
    case 'measured':
      return value.value;
    case 'list':
      return null;
  }
}

const shownDigits = 6;

/** Longest decimal that stands in place of a fraction. */
const longestDecimal = 12;

/** "19/2" as 9.5, "1/3" as it is. */
function exactText(value: Rational): string {
  const decimal = String(toDouble(value));
  const read = decimal.length <= longestDecimal ? parseRational(decimal) : null;
  return read !== null && equals(read, value) ? decimal : formatRational(value);
}

/** A measured number as a sentence shows it. */
export const shownValue = (value: number): number => Number(value.toPrecision(shownDigits));

/** A value in a sentence. `full` shows every digit of a measured number. */
export function valueText(value: ClaimValue, full = false): string {
  switch (value.kind) {
    case 'exact':
      return exactText(value.value).replace('-', '−');
    case 'measured':
      return full ? String(value.value).replace('-', '−') : numberText(value.value, { digits: shownDigits });
    case 'word':
      return `“${value.text}”`;
    case 'truth':
      return String(value.value);
    case 'list':
      return `a list of ${value.entries.length}`;
  }
}
