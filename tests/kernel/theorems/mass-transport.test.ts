import { readNetwork } from '@stillroom/shared/notation';
import type { Verdict } from '@stillroom/shared/cells';
import { describe, expect, test } from 'vitest';
import { expectSilence, verdictOn } from '../../support/verdicts.ts';

function transport(text: string): Verdict {
  const { network, complaints } = readNetwork(text);
  if (network === null) throw new Error(complaints.map(({ message }) => message).join(' '));
  return verdictOn(network, 'mass-transport');
}

/** Both directions between two sites with the same law; `u` is written with # for the count on its own site. */
function twoSites(...laws: readonly (readonly [size: number, u: string])[]): string {
  return laws
    .flatMap(([size, u]) =>
      [
        ['X1', 'X2'],
        ['X2', 'X1'],
      ].map(([from, to]) => `${size} ${from} -> ${size} ${to} | law = ${u.replaceAll('#', from!)}`),
    )
    .join('\n');
}

describe('rates that factorise for every n (Evans, Majumdar, Zia 2004; Greenblatt, Lebowitz 2006)', () => {
  test('u(2|n) = c u(1|n) u(1|n − 1), as rational functions: no start is needed', () => {
    // u(1|n) = n/(n + 1), so u(1|n) u(1|n − 1) = (n − 1)/(n + 1).
    const verdict = transport(twoSites([1, '#/(# + 1)'], [2, '3*(# - 1)/(# + 1)']));
    expect(verdict).toMatchObject({ applies: 'yes', scope: 'these constants' });
    expect(verdict.hypotheses.some(({ text }) => text.includes('for every n'))).toBe(true);
  });

  test('three servers on each site: min(n, 3), in pairs min(n, 3) min(n − 1, 3)', () => {
    // The checker compares counts up to a bound only where the law has a choice in it.
    const text = `${twoSites([1, 'min(#, 3)'], [2, 'min(#, 3)*min(# - 1, 3)'])}\nstart X1 = 12`;
    expect(transport(text)).toMatchObject({ applies: 'yes', scope: 'these constants and start' });
    expectSilence(
      transport(`${twoSites([1, 'min(#, 3)'], [2, 'min(#, 3)^2'])}\nstart X1 = 12`),
      /no product is stationary(?<!not follow that no product is stationary)/,
    );
  });

  test('a law that fits for small counts only is found out', () => {
    const late = twoSites([1, '#'], [2, '#*(# - 1) + max(# - 60, 0)']);
    const verdict = transport(late);
    expect(verdict.applies).toBe('no');
    expect(verdict.hypotheses.find(({ holds }) => holds === false)?.text).toContain('out of 61');
    expect(transport(`${late}\nstart X1 = 40`)).toMatchObject({
      applies: 'yes',
      scope: 'these constants and start',
    });
  });

  test('pairs alone always factorise: w follows in steps of two', () => {
    expect(transport(twoSites([2, '#*(# - 1)/(# + 3)'])).applies).toBe('yes');
    expect(transport(twoSites([2, '#*(# - 1)'], [4, '#*(# - 1)*(# - 2)*(# - 3)'])).applies).toBe('yes');
    expect(transport(twoSites([2, '#*(# - 1)'], [4, '#*(# - 1)'])).applies).toBe('no');
  });

  test('a rate that depends on another site does not factorise', () => {
    const verdict = transport('X1 -> X2 | law = X1*(1 + X2)\nX2 -> X1 | law = X2');
    expect(verdict.applies).toBe('no');
    expect(verdict.hypotheses.find(({ holds }) => holds === false)?.text).toContain('depends on X2');
  });

  test('laws are in concentrations, the comparison in counts: V f(n/V)', () => {
    // V = 2: the law 4 x (x − 1/2) is 2 n (n − 1) in counts, the law x is n.
    const text = `${twoSites([1, '#'], [2, '4*#*(# - 1/2)'])}\nvolume V = 2`;
    expect(transport(text).applies).toBe('yes');
    expect(transport(text.replace('volume V = 2', 'volume V = 3')).applies).toBe('no');
  });

  test('factorised rates whose sizes do not balance: the ring needs Σ v z^m equal in and out', () => {
    const ring = (back: number): string =>
      `X1 -> X2 | law = X1\nX2 -> X1 | law = 2*X2\n2 X1 -> 2 X2 | law = X1*(X1 - 1)\n2 X2 -> 2 X1 | law = ${back}*X2*(X2 - 1)`;
    expect(transport(ring(4)).applies).toBe('yes');
    expect(transport(ring(5)).applies).toBe('no');
  });

  test('undecided where a law is no rational function', () => {
    expect(transport('X1 -> X2 | law = exp(X1) - 1\nX2 -> X1 | law = X2').applies).toBe('undecided');
  });
});
