import { type FunctionalComponent, h, type VNodeChild } from 'vue';
import { setNumber } from './numbers.ts';
import type { Sides } from './shapes.ts';

/** A name with its indices lowered: X[1,2] is X with 1,2 beneath. */
function lowered(name: string): VNodeChild[] {
  const match = /^(.+?)\[(.+)\]$/u.exec(name);
  return match === null ? [name] : [match[1], h('sub', match[2])];
}

/** A species, upright. */
export const SpeciesName: FunctionalComponent<{ name: string }> = ({ name }) => h('span', lowered(name));
SpeciesName.props = ['name'];

/**
 * A constant in italic. A letter followed by one or two more, or k and K followed by anything, reads as a letter with
 * an index (ks, kcat); longer names stay words (wash).
 */
export const ConstantName: FunctionalComponent<{ name: string }> = ({ name }) => {
  const match =
    /^([kK])_?([\p{L}\p{N}']+)$/u.exec(name) ??
    // What begins with a vowel is more likely a word, such as on or off.
    /^([^aeiou\P{L}])([\p{L}\p{N}']{1,2})$/iu.exec(name) ??
    /^(\p{L})_([\p{L}\p{N}']{1,2})$/u.exec(name) ??
    /^(\p{L})(\p{N}{1,2})$/u.exec(name) ??
    /^(\p{L}+)_([\p{L}\p{N}']+)$/u.exec(name);
  return match === null ? h('i', lowered(name)) : h('i', [match[1], h('sub', match[2])]);
};
ConstantName.props = ['name'];

/** A complex: 2 A + B, the zero complex as ∅. */
export const ComplexText: FunctionalComponent<{ of: Sides }> = ({ of }) => {
  const terms = Object.entries(of);
  if (terms.length === 0) return h('span', '∅');
  return h(
    'span',
    terms.flatMap(([name, coefficient], i) => [
      i === 0 ? '' : '\u2009+\u2009',
      String(coefficient) === '1' ? '' : `${coefficient}\u2009`,
      ...lowered(name),
    ]),
  );
};
ComplexText.props = ['of'];

/** A complex as plain text, for drawings and labels. */
export function complexLabel(of: Sides): string {
  const terms = Object.entries(of);
  if (terms.length === 0) return '∅';
  return terms
    .map(([name, coefficient]) => (String(coefficient) === '1' ? name : `${coefficient} ${name}`))
    .join(' + ');
}

/** A number with a power of ten set properly; null is "undecided". */
export const NumberText: FunctionalComponent<{ value: number | null; digits?: number }> = ({
  value,
  digits,
}) => {
  if (value === null) return h('span', { class: 'muted' }, 'undecided');
  const { digits: text, exponent } = setNumber(value, digits ?? 4);
  if (exponent === null) return h('span', { class: 'num' }, text);
  const mantissa = text === '1' ? '' : text === '−1' ? '−' : `${text}\u2009×\u2009`;
  return h('span', { class: 'num' }, [`${mantissa}10`, h('sup', setExponent(exponent))]);
};
NumberText.props = ['value', 'digits'];

const setExponent = (exponent: number) => String(exponent).replace('-', '−');
