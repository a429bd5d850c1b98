import { claimPaths, type ClaimTerm, parseClaim } from '@stillroom/shared/paths';
import { describe, expect, test } from 'vitest';

/** A term with all its brackets. */
function brackets(term: ClaimTerm): string {
  switch (term.kind) {
    case 'number':
      return term.text;
    case 'word':
      return JSON.stringify(term.text);
    case 'truth':
      return String(term.value);
    case 'path':
      return [term.path.head, ...term.path.steps].join('.');
    case 'negate':
      return `(-${brackets(term.of)})`;
    case 'binary':
      return `(${brackets(term.left)}${term.operator}${brackets(term.right)})`;
    case 'call':
      return `${term.name}(${term.arguments.map(brackets).join(',')})`;
  }
}

const left = (text: string) => {
  const claim = parseClaim(`${text} == 0`);
  if (!claim.ok) throw new Error(claim.misreading.message);
  return brackets(claim.value.left);
};

describe('what binds tighter', () => {
  test.each([
    ['1 + 2 * 3', '(1+(2*3))'],
    ['1 - 2 - 3', '((1-2)-3)'],
    ['8 / 4 / 2', '((8/4)/2)'],
    ['2 ^ 3 ^ 2', '(2^(3^2))'],
    ['-2 ^ 2', '(-(2^2))'],
    ['2 ^ -1', '(2^(-1))'],
    ['-(a.x + 1) * 2', '((-(a.x+1))*2)'],
    ['min(1, 2 + 3, a.y)', 'min(1,(2+3),a.y)'],
    ['a.b["c d"][3]', 'a.b.c d.3'],
    ['first.species.x', 'first.species.x'],
    ['true', 'true'],
    ['1e-3 + .5', '(1e-3+.5)'],
  ])('%s', (text, whole) => expect(left(text)).toBe(whole));
});

test('every comparison', () => {
  for (const comparison of ['==', '!=', '<', '<=', '>', '>=']) {
    const claim = parseClaim(`a.x${comparison}1`);
    expect(claim.ok && claim.value.comparison).toBe(comparison);
  }
});

test('paths with their places', () => {
  const claim = parseClaim('last(run1.x) > at(run2.y, 3) - run1.z');
  expect(claim.ok && claimPaths(claim.value).map(({ head, from, to }) => [head, from, to])).toEqual([
    ['run1', 5, 11],
    ['run2', 18, 24],
    ['run1', 31, 37],
  ]);
});

test('depth without end is refused in words, not by the stack', () => {
  for (const text of [`${'('.repeat(1e5)}1 == 1`, `${'-'.repeat(1e5)}1 == 1`, `${'2^'.repeat(1e5)}1 == 1`]) {
    const claim = parseClaim(text);
    expect(claim.ok ? '' : claim.misreading.message).toBe('This claim is nested too deeply.');
  }
});
