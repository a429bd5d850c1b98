import type { Evidence } from './evidence.ts';

/** Mass action everywhere and nothing else that changes a species; or a reaction for which it is not so. */
export function massAction({ network, plain, holds, witness }: Evidence): string | null {
  const untouched = network.events.length === 0 && network.rateRules.size === 0;
  const everywhere = plain.reactions.every((reaction) => reaction.massAction);
  if (holds) return untouched && everywhere ? null : 'some rate is not mass action.';
  if (!untouched) return null;
  if (witness?.kind !== 'arrow') return 'no reaction is named.';
  return plain.reactions[witness.reaction]?.massAction === false
    ? null
    : 'the reaction named has mass action.';
}

/** As `massAction`, with whole numbers of molecules and no weights. */
export function massActionInCounts(evidence: Evidence): string | null {
  const { network, plain, holds } = evidence;
  const whole = plain.complexes.every((complex) =>
    [...complex.values()].every(({ denominator }) => denominator === 1n),
  );
  const plainCounts = whole && network.weights.size === 0;
  if (plainCounts && namesPower(evidence)) return null;
  if (holds)
    return plainCounts ? massAction(evidence) : 'coefficients are fractions, or a species has a weight.';
  return plainCounts ? massAction(evidence) : null;
}

/** A "no" that names a written law whose reactants hold several molecules of one species. */
export function namesPower({ plain, holds, witness }: Evidence): boolean {
  const reaction = !holds && witness?.kind === 'arrow' ? plain.reactions[witness.reaction] : undefined;
  if (reaction === undefined || !reaction.written || !reaction.massAction) return false;
  return [...plain.complexes[reaction.from]!.values()].some(({ numerator }) => numerator > 1n);
}
