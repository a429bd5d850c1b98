/** A number as it is set: sign and digits, and a power of ten where the plain form would mislead the eye. */
export interface SetNumber {
  readonly digits: string;
  readonly exponent: number | null;
}

/**
 * A whole number with its digits in threes, by narrow blanks that do not break: "100 000". Four digits stand together, as
 * they do in the books of the field.
 */
export const grouped = (count: number): string =>
  Math.abs(count) < 10_000
    ? minus(String(count))
    : minus(String(count)).replaceAll(/\B(?=(?:\d{3})+$)/gu, '\u202F');

const minus = (text: string) => text.replace('-', '−');

/** Trims the zeros that rounding left behind a decimal point. */
const trimmed = (text: string) => (text.includes('.') ? text.replace(/\.?0+$/u, '') : text);

/** Sets a number with at most `digits` significant digits; below 0.0001 and from 100 000 on with a power of ten. */
export function setNumber(value: number, digits = 4): SetNumber {
  if (value === 0) return { digits: '0', exponent: null };
  const size = Math.abs(value);
  if (Number.isInteger(value) && size < 1e6) return { digits: grouped(value), exponent: null };
  if (size >= 0.99999e-4 && size < 1e5) {
    const plain = value.toPrecision(digits);
    return { digits: minus(trimmed(plain.includes('e') ? String(Number(plain)) : plain)), exponent: null };
  }
  const [mantissa = '', exponent = '0'] = value.toExponential(digits - 1).split('e');
  return { digits: minus(trimmed(mantissa)), exponent: Number(exponent) };
}

const raised = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** An exponent in raised digits, for places that hold plain text only. */
export const raise = (exponent: number): string =>
  String(exponent)
    .replace('-', '⁻')
    .replaceAll(/\d/gu, (digit) => raised[Number(digit)] ?? digit);

/** A number as plain text: "5.06 × 10⁻⁵". */
export function numberText(value: number | null | undefined, digits = 4): string {
  if (value === undefined || value === null) return 'undecided';
  const { digits: text, exponent } = setNumber(value, digits);
  if (exponent === null) return text;
  return `${text === '1' ? '' : text === '−1' ? '−' : `${text} × `}10${raise(exponent)}`;
}

/** Milliseconds as a slip says them: "0.02 s", "2.7 s", "3 min". */
export function tookText(ms: number): string {
  if (ms < 95) return `${Math.max(0.01, Math.round(ms / 10) / 100)} s`;
  if (ms < 10_000) return `${Number((ms / 1000).toPrecision(2))} s`;
  if (ms < 120_000) return `${Math.round(ms / 1000)} s`;
  return `${Math.round(ms / 60_000)} min`;
}

/** A unit as printed in the notation ("/uM/s") in the way it is set: "µM⁻¹ s⁻¹". */
export function unitText(unit: string | null | undefined): string {
  if (unit === undefined || unit === null || unit === '' || unit === '1') return '';
  const parts: string[] = [];
  for (const [, sign, word, power] of unit.matchAll(/([/*· ]?)\s*([^\s/*·^\d]+)(?:\^?(-?\d+))?/gu)) {
    if (word === undefined) continue;
    const exponent = (sign === '/' ? -1 : 1) * Number(power ?? 1);
    parts.push(`${word.replace(/^[uμ](?=\p{L})/u, 'µ')}${exponent === 1 ? '' : raise(exponent)}`);
  }
  return parts.join(' ');
}
