import type { ClaimComparison } from '@stillroom/shared/paths';
import { compare } from '../exact/index.ts';
import { doubleOf, numberIn } from './arithmetic.ts';
import { ClaimMistake, type ClaimValue, shownValue, valueText } from './claim-value.ts';

const words: Readonly<Record<ClaimComparison, readonly [holds: string, fails: string]>> = {
  '==': ['equals', 'does not equal'],
  '!=': ['differs from', 'equals'],
  '<': ['is below', 'is not below'],
  '<=': ['is at most', 'is above'],
  '>': ['is above', 'is not above'],
  '>=': ['is at least', 'is below'],
};

const byOrder: Readonly<Record<ClaimComparison, (order: number) => boolean>> = {
  '==': (order) => order === 0,
  '!=': (order) => order !== 0,
  '<': (order) => order < 0,
  '<=': (order) => order <= 0,
  '>': (order) => order > 0,
  '>=': (order) => order >= 0,
};

const natures: Readonly<Record<ClaimValue['kind'], string>> = {
  exact: 'a number',
  measured: 'a number',
  word: 'a word',
  truth: 'a truth value',
  list: 'a list',
};

/** −1, 0, 1 as left is below, equal to or above right; a mistake where they cannot be compared so. */
function orderOf(comparison: ClaimComparison, left: ClaimValue, right: ClaimValue): number {
  const equality = comparison === '==' || comparison === '!=';
  const bare = (value: ClaimValue) =>
    value.kind === 'word' ? value.text : value.kind === 'truth' ? value.value : null;
  const [leftBare, rightBare] = [bare(left), bare(right)];
  if (leftBare !== null || rightBare !== null) {
    if (left.kind !== right.kind) {
      throw new ClaimMistake(
        `${natures[left.kind]} cannot be compared with ${natures[right.kind]}.`.replace(/^a/u, 'A'),
      );
    }
    if (!equality)
      throw new ClaimMistake(`${comparison} compares numbers; words and truth values take == or !=.`);
    return leftBare === rightBare ? 0 : 1;
  }
  const a = numberIn(left, 'A comparison');
  const b = numberIn(right, 'A comparison');
  if (a.kind === 'exact' && b.kind === 'exact') return compare(a.value, b.value);
  if (equality) {
    throw new ClaimMistake(
      `${comparison} compares exact values, and ${valueText(a.kind === 'measured' ? a : b)} is measured.`,
      null,
      'Write abs(a - b) < tolerance.',
    );
  }
  const [x, y] = [doubleOf(a), doubleOf(b)];
  return x < y ? -1 : x > y ? 1 : 0;
}

/** Whether two numbers, shown in few digits, would seem to stand otherwise than they do. */
function hiddenByRounding(order: number, left: ClaimValue, right: ClaimValue): boolean {
  const shown = (value: ClaimValue) =>
    value.kind === 'measured' ? shownValue(value.value) : value.kind === 'exact' ? doubleOf(value) : null;
  const [a, b] = [shown(left), shown(right)];
  return a !== null && b !== null && Math.sign(a - b) !== order;
}

/** Whether a comparison holds, and that in words: "9.83 is above 9.5." */
export function judge(
  comparison: ClaimComparison,
  left: ClaimValue,
  right: ClaimValue,
): { readonly holds: boolean; readonly why: string } {
  const order = orderOf(comparison, left, right);
  const holds = byOrder[comparison](order);
  const full = hiddenByRounding(order, left, right);
  const [a, b] = [valueText(left, full), valueText(right, full)];
  const exactly = left.kind === 'exact' && right.kind === 'exact' ? ', exactly' : '';
  return { holds, why: `${a} ${words[comparison][holds ? 0 : 1]} ${b}${exactly}.` };
}
