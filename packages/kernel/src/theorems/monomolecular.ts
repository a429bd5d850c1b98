import type { Hypothesis } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { massActionInCounts } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Jahnke, Huisinga 2007. */
export const monomolecular: Theorem = {
  id: 'monomolecular',
  title: 'Monomolecular network',
  statement:
    'When no complex has more than one molecule, counts that start from fixed numbers are at all times a sum of independent multinomial and Poisson variables, whose parameters solve the rate equations.',
  citation: [sources.jahnkeHuisinga2007],
  kinetics: 'mass action',
  judge(context) {
    const hypotheses = [massActionInCounts(context), noLargeComplex(context)];
    const applies = appliesWhenAllHold(hypotheses);
    return {
      applies,
      scope: 'all constants',
      hypotheses,
      conclusion: {
        yes: 'In counts, from fixed numbers of molecules the law at every time is that of a sum of independent multinomial and Poisson variables with parameters from the rate equations; from independent Poisson counts it stays a product of Poisson laws.',
        no: 'The theorem does not apply: nothing follows from it about the law at a given time.',
        undecided: 'Undecided.',
      }[applies],
    };
  },
};

/** No complex with two or more molecules; a larger one is named. */
export function noLargeComplex(context: TheoremContext): Hypothesis {
  const claim = 'no large complex';
  const text = 'No complex has two or more molecules.';
  const large = largeComplexes(context)[0];
  return large === undefined
    ? { claim, text, holds: true }
    : {
        claim,
        text: `${text} ${context.complexLabel(large)} has.`,
        holds: false,
        witness: { kind: 'set', complexes: [large] },
      };
}

/** Complexes of two or more molecules. */
export function largeComplexes(context: TheoremContext): number[] {
  return context.memo('large complexes', () => {
    const { offsets, numerators, denominators } = context.structure.complexes;
    const large: number[] = [];
    for (let complex = 0; complex < context.complexCount; complex++) {
      let size = 0;
      for (let k = offsets[complex]!; k < offsets[complex + 1]!; k++)
        size += numerators[k]! / (denominators?.[k] ?? 1);
      if (size > 1) large.push(complex);
    }
    return large;
  });
}
