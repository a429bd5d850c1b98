import type { HypothesisClaim, Witness } from '@stillroom/shared/cells';
import type { Rational } from '../../exact/index.ts';
import { compare, equals, fromDouble, isZero, multiply, sign, toDouble, ZERO } from '../../exact/index.ts';
import type { Equation, ExactInterval } from './exact-box.ts';
import { holdsOneZero } from './exact-box.ts';
import type { Amounts, PlainNetwork } from './plain-network.ts';
import { arrowRates, changeOf, dimension, paired } from './plain-network.ts';
import { exactOf } from './reading.ts';
import type { Evidence, Finding } from './evidence.ts';

type States = Extract<Witness, { kind: 'states' }>;

/** At least two disjoint boxes, each with exactly one positive steady state for the same constants and totals. */
export function severalStates({ network, plain, verdict, holds, witness }: Evidence): string | null {
  if (!holds || witness?.kind !== 'states') return 'the states are missing.';
  if (witness.boxes.length < 2) return 'there are fewer than two boxes.';
  const rates = ratesOf(plain, witness);
  if (rates === null) return 'a constant is missing or not positive.';
  const laws = witness.totals.map(
    ({ law }) => new Map(Object.entries(law).map(([name, value]) => [name, exactOf(value)])),
  );
  const complaint = lawsComplaint(plain, laws);
  if (complaint !== null) return complaint;
  if (verdict.scope === 'these constants and start') {
    const own = arrowRates(plain);
    if (own === null || [...rates].some(([key, rate]) => !equals(rate, own.get(key)!)))
      return 'the constants are not those of the text.';
    const start: Amounts = new Map([...network.start].map(([i, { exact }]) => [network.species[i]!, exact!]));
    const off = laws.findIndex((law, i) => !equals(paired(law, start), exactOf(witness.totals[i]!.value)));
    if (off >= 0) return 'the totals are not those of the start.';
  }
  const equations = equationsOf(
    plain,
    rates,
    laws,
    witness.totals.map(({ value }) => exactOf(value)),
  );
  const boxes = witness.boxes.map((box) => plain.species.map((name) => interval(box[name])));
  if (boxes.some((box) => box.some(({ low }) => sign(low) <= 0))) return 'a box is not positive.';
  for (const [k, box] of boxes.entries()) {
    const meets = boxes.slice(0, k).some((other) => box.every((side, i) => overlap(side, other[i]!)));
    if (meets) return 'two boxes meet.';
    if (!holdsOneZero(equations, box)) return `box ${k} is not proven to hold exactly one steady state.`;
  }
  return null;
}

function ratesOf(plain: PlainNetwork, { constants }: States): Map<string, Rational> | null {
  const rates = new Map<string, Rational>();
  for (const [index, value] of Object.entries(constants)) {
    const reaction = plain.reactions[Number(index)];
    const exact = exactOf(value);
    if (reaction === undefined || sign(exact) <= 0) return null;
    rates.set(`${reaction.from} ${reaction.to}`, exact);
  }
  return plain.reactions.every(({ from, to }) => rates.has(`${from} ${to}`)) ? rates : null;
}

function lawsComplaint(plain: PlainNetwork, laws: readonly Amounts[]): string | null {
  const changes = plain.reactions.map((reaction) => changeOf(plain, reaction));
  if (laws.some((law) => changes.some((change) => !isZero(paired(law, change)))))
    return 'a total is not conserved.';
  return dimension(laws) === laws.length && laws.length === plain.species.length - dimension(changes)
    ? null
    : 'the totals do not fix a class.';
}

/** As many independent rates of change as the rank, and the totals. */
function equationsOf(
  plain: PlainNetwork,
  rates: ReadonlyMap<string, Rational>,
  laws: readonly Amounts[],
  totals: readonly Rational[],
): Equation[] {
  const arrows = [
    ...new Map(plain.reactions.map((reaction) => [`${reaction.from} ${reaction.to}`, reaction])),
  ];
  const rowOf = (name: string): Amounts =>
    new Map(
      arrows.flatMap(([key, reaction]) => {
        const amount = changeOf(plain, reaction).get(name);
        return amount === undefined ? [] : [[key, amount] as const];
      }),
    );
  const chosen: string[] = [];
  for (const name of plain.species) {
    if (dimension([...chosen, name].map(rowOf)) > chosen.length) chosen.push(name);
  }
  const unit = (name: string): number[] => plain.species.map((other) => (other === name ? 1 : 0));
  return [
    ...chosen.map((name): Equation => ({
      terms: [...rowOf(name)].map(([key, amount]) => ({
        coefficient: multiply(amount, rates.get(key)!),
        exponents: exponentsOf(plain, Number(key.split(' ')[0])),
      })),
      constant: ZERO,
    })),
    ...laws.map((law, i): Equation => ({
      terms: [...law].map(([name, weight]) => ({ coefficient: weight, exponents: unit(name) })),
      constant: totals[i]!,
    })),
  ];
}

function exponentsOf(plain: PlainNetwork, complex: number): number[] {
  return plain.species.map((name) => toDouble(plain.complexes[complex]!.get(name) ?? ZERO));
}

function interval(side: readonly [number, number] | undefined): ExactInterval {
  if (side === undefined || !(side[0] < side[1])) throw new Error('a side of a box is missing');
  return { low: fromDouble(side[0]), high: fromDouble(side[1]) };
}

function overlap(a: ExactInterval, b: ExactInterval): boolean {
  return compare(a.low, b.high) <= 0 && compare(b.low, a.high) <= 0;
}

/** For each theorem that excludes two states of one class: sets of claims one of which has to stand complete. */
const UNIQUENESS: Readonly<Record<string, readonly (readonly HypothesisClaim[])[]>> = {
  'no-positive-steady-state': [['not consistent', 'rates follow reactants']],
  'deficiency-zero': [
    ['deficiency', 'weakly reversible', 'mass action'],
    ['deficiency', 'not weakly reversible', 'rates follow reactants'],
  ],
  'deficiency-one': [
    ['mass action', 'class deficiency at most one', 'class deficiencies add up', 'one terminal class each'],
  ],
  injective: [['mass action', 'determinants of one sign']],
  concordant: [['rates are weakly monotonic', 'concordant']],
  'deficiency one algorithm': [['mass action', 'regular of deficiency one']],
  'degree criterion': [
    ['mass action', 'critical polynomial of one sign', 'rank one'],
    ['mass action', 'critical polynomial of one sign', 'strongly endotactic'],
    ['mass action', 'critical polynomial of one sign', 'no critical siphon', 'conservative'],
    ['mass action', 'critical polynomial of one sign', 'no critical siphon', 'inward drift'],
  ],
};

/** A "yes" names a theorem whose hypotheses all stand in the verdict; a "no" carries two verified states. */
export function atMostOne(evidence: Evidence): Finding {
  return evidence.holds ? uniquenessComplaint(evidence) : severalStates({ ...evidence, holds: true });
}

/** Excluded by a theorem whose hypotheses all stand in the verdict. */
export function severalExcluded(evidence: Evidence): Finding {
  return evidence.holds ? 'an exclusion is stated as failing.' : uniquenessComplaint(evidence);
}

function uniquenessComplaint({ verdict }: Evidence): string | null {
  const routes = UNIQUENESS[verdict.case ?? ''];
  if (routes === undefined) return 'no theorem is named.';
  const stated = new Set(verdict.hypotheses.filter(({ holds }) => holds === true).map(({ claim }) => claim));
  return routes.some((claims) => claims.every((claim) => stated.has(claim)))
    ? null
    : 'a hypothesis of the theorem named is missing.';
}
