import { compare, isZero, sign, ZERO, add } from '../../exact/index.ts';
import { components, deficiencyOf, leadsTo, nonterminal, sameAmount } from './plain-network.ts';
import { exactOf, fluxVector } from './reading.ts';
import type { Evidence } from './evidence.ts';

/** Whether the two numbers of the witness are these. */
function numbersAre({ witness }: Evidence, left: number, right: number | null): string | null {
  if (witness?.kind !== 'number') return 'the two numbers are missing.';
  if (Number(witness.left) !== left) return `the first number is ${left}, not ${witness.left}.`;
  if (right !== null && Number(witness.right) !== right)
    return `the second number is ${right}, not ${witness.right}.`;
  return null;
}

/** δ recounted from the complexes, the components and the dimension. */
export function deficiency(evidence: Evidence): string | null {
  const { plain, holds, witness } = evidence;
  const value = deficiencyOf(plain, components(plain));
  const complaint = numbersAre(evidence, value, null);
  if (complaint !== null || witness?.kind !== 'number') return complaint;
  return holds === (compare(exactOf(witness.left), exactOf(witness.right)) === 0)
    ? null
    : 'the numbers say the opposite.';
}

/** The largest deficiency of a component, compared with 1. */
export function classDeficiency(evidence: Evidence): string | null {
  const { plain, holds } = evidence;
  const largest = Math.max(0, ...components(plain).map((group) => deficiencyOf(plain, [group])));
  return (
    numbersAre(evidence, largest, 1) ?? (holds === largest <= 1 ? null : 'the numbers say the opposite.')
  );
}

/** Σ δ_i and δ. */
export function deficienciesAddUp(evidence: Evidence): string | null {
  const { plain, holds } = evidence;
  const groups = components(plain);
  const sum = groups.reduce((total, group) => total + deficiencyOf(plain, [group]), 0);
  const whole = deficiencyOf(plain, groups);
  return (
    numbersAre(evidence, sum, whole) ?? (holds === (sum === whole) ? null : 'the numbers say the opposite.')
  );
}

/** One terminal strong class per component, or two complexes of one component from different terminal classes. */
export function oneTerminalClassEach({ plain, holds, witness }: Evidence): string | null {
  const outside = nonterminal(plain);
  if (holds) {
    for (const group of components(plain)) {
      const terminal = group.filter((complex) => !outside.has(complex));
      if (terminal.some((complex) => !leadsTo(plain, terminal[0]!, complex)))
        return 'a component has several.';
    }
    return null;
  }
  if (witness?.kind !== 'set' || !('complexes' in witness)) return 'no complexes are named.';
  const [a, b] = witness.complexes;
  if (a === undefined || b === undefined || outside.has(a) || outside.has(b) || leadsTo(plain, a, b)) {
    return 'the complexes named do not lie in different terminal strong classes.';
  }
  return components(plain).some((group) => group.includes(a) && group.includes(b))
    ? null
    : 'the complexes named are not connected.';
}

/** A positive circulation on all arrows shows it; an arrow without way back refutes it. */
export function weaklyReversible(evidence: Evidence): string | null {
  return evidence.holds ? circulates(evidence) : noWayBack(evidence);
}

/** The opposite claim from the same evidence. */
export function notWeaklyReversible(evidence: Evidence): string | null {
  return evidence.holds ? noWayBack(evidence) : circulates(evidence);
}

function circulates({ plain, witness }: Evidence): string | null {
  const flux = fluxVector(witness, plain);
  const balance = plain.complexes.map(() => ZERO);
  const carried = new Set<string>();
  for (const [index, value] of flux) {
    if (sign(value) <= 0) return 'the circulation is not positive.';
    const { from, to } = plain.reactions[index]!;
    carried.add(`${from} ${to}`);
    balance[to] = add(balance[to]!, value);
    balance[from] = add(balance[from]!, { numerator: -value.numerator, denominator: value.denominator });
  }
  if (plain.reactions.some(({ from, to }) => !carried.has(`${from} ${to}`)))
    return 'an arrow carries no flow.';
  return balance.every(isZero) ? null : 'inflow and outflow differ at a complex.';
}

function noWayBack({ plain, witness }: Evidence): string | null {
  const reaction = witness?.kind === 'arrow' ? plain.reactions[witness.reaction] : undefined;
  if (reaction === undefined) return 'no reaction is named.';
  return leadsTo(plain, reaction.to, reaction.from) ? 'a path leads back along the reaction named.' : null;
}

/** Every arrow has its reverse, or the arrow named has none. */
export function reversible({ plain, holds, witness }: Evidence): string | null {
  const hasReverse = (index: number): boolean => {
    const reaction = plain.reactions[index];
    return plain.reactions.some(({ from, to }) => from === reaction?.to && to === reaction.from);
  };
  if (holds)
    return plain.reactions.every((_, index) => hasReverse(index)) ? null : 'an arrow has no reverse.';
  if (witness?.kind !== 'arrow' || plain.reactions[witness.reaction] === undefined)
    return 'no reaction is named.';
  return hasReverse(witness.reaction) ? 'the reaction named has its reverse.' : null;
}

/** Two non-terminal complexes that differ in one species; a "no" is confirmed by trying all pairs. */
export function differInOneSpecies({ plain, holds, witness }: Evidence): string | null {
  const outside = nonterminal(plain);
  const differ = (a: number, b: number): boolean =>
    plain.species.filter((name) => !sameAmount(plain.complexes[a]!, plain.complexes[b]!, name)).length === 1;
  return confirmPair(outside, differ, holds, witness);
}

/** Two different non-terminal complexes one of which contains the other. */
export function nested({ plain, holds, witness }: Evidence): string | null {
  const outside = nonterminal(plain);
  const within = (a: number, b: number): boolean =>
    a !== b &&
    [...plain.complexes[a]!].every(
      ([name, amount]) => compare(amount, plain.complexes[b]!.get(name) ?? ZERO) <= 0,
    );
  return confirmPair(outside, within, holds, witness);
}

function confirmPair(
  outside: ReadonlySet<number>,
  related: (a: number, b: number) => boolean,
  holds: boolean,
  witness: Evidence['witness'],
): string | null {
  if (!holds) {
    const pairs = [...outside].some((a) => [...outside].some((b) => related(a, b)));
    return pairs ? 'there is such a pair.' : null;
  }
  if (witness?.kind !== 'set' || !('complexes' in witness)) return 'no complexes are named.';
  const [a, b] = witness.complexes;
  if (a === undefined || b === undefined || !outside.has(a) || !outside.has(b))
    return 'a complex named is terminal.';
  return related(a, b) ? null : 'the complexes named are not related in this way.';
}

/** One component (1 and 1), or a dimension of at most 3 (the dimension and 3). */
export function attractionProven(evidence: Evidence): string | null {
  const { plain, holds, witness } = evidence;
  if (!holds || witness?.kind !== 'number') return 'the number is missing.';
  const groups = components(plain);
  if (witness.right === 1)
    return groups.length === 1 ? numbersAre(evidence, 1, 1) : 'there are several components.';
  const rank = plain.complexes.length - groups.length - deficiencyOf(plain, groups);
  return rank <= 3 ? numbersAre(evidence, rank, 3) : 'the rank is above 3.';
}

/** The dimension, compared with 1. */
export function rankOne(evidence: Evidence): string | null {
  const { plain, holds } = evidence;
  const groups = components(plain);
  const rank = plain.complexes.length - groups.length - deficiencyOf(plain, groups);
  return numbersAre(evidence, rank, 1) ?? (holds === (rank === 1) ? null : 'the numbers say the opposite.');
}
