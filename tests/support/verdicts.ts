import type { Verdict, VerdictId } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import { checkWitness, contextOf } from '@stillroom/kernel/theorems';
import { expect } from 'vitest';
import type { NetworkOptions } from './network.ts';
import { buildNetwork } from './network.ts';

/** The verdict of one theorem, after the independent checker has confirmed its evidence. */
export function verdictOn(network: Network, id: VerdictId): Verdict {
  const verdict = contextOf(network).verdict(id);
  expect(checkWitness(network, verdict)).toEqual({
    ok: true,
    confirmed: true,
    why: 'Every hypothesis was confirmed from its witness.',
  });
  return verdict;
}

/** The same for a network in one line. */
export function judge(id: VerdictId, text: string, options: NetworkOptions = {}): Verdict {
  return verdictOn(buildNetwork(text, options), id);
}

/** The texts of the hypotheses that fail. */
export function failing(verdict: Verdict): string[] {
  return verdict.hypotheses.filter(({ holds }) => holds === false).map(({ text }) => text);
}

/** A "no" must say that nothing follows, and nothing in it may read as the opposite of the theorem. */
export function expectSilence(verdict: Verdict, opposite: RegExp): void {
  expect(verdict.applies).toBe('no');
  expect(failing(verdict).length).toBeGreaterThan(0);
  expect(verdict.conclusion).toMatch(/nothing follows|does not follow|says nothing/i);
  expect(verdict.conclusion).not.toMatch(opposite);
}
