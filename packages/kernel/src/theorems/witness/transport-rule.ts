import type { Expression } from '@stillroom/shared/expression';
import { exactValue } from '@stillroom/shared/expression';
import type { Rational } from '../../exact/index.ts';
import {
  add,
  compare,
  divide,
  equals,
  multiply,
  ONE,
  rational,
  sign,
  toDouble,
  ZERO,
} from '../../exact/index.ts';
import { isComplexBalanced } from './balance-rules.ts';
import type { Evidence, Finding } from './evidence.ts';
import { Unconfirmed } from './evidence.ts';
import type { PlainNetwork } from './plain-network.ts';

/** Units up to which rates are compared where no start bounds them: above the degree of any law written by hand. */
const UNBOUNDED = 120;
const MOST_UNITS = 400;

/** Rates have the form by being mass action or weighted, or are worked out again unit by unit. */
export function ratesFactorise(evidence: Evidence): Finding {
  const { plain, holds } = evidence;
  if (hasForm(plain)) return holds ? null : 'the rates factorise by their form.';
  const found = factorise(evidence);
  if (found === null) return new Unconfirmed('a rate has no exact value.');
  if (!holds) return found.fits ? 'the rates fit at every n looked at.' : null;
  if (!found.fits) return 'a rate does not fit.';
  return found.bounded || !callsFunctions(evidence)
    ? null
    : new Unconfirmed('the rates were compared for small counts only.');
}

/** Complex balance with v in place of the constants. */
export function transportBalances(evidence: Evidence): Finding {
  const { plain, holds } = evidence;
  const found = factorise(evidence);
  if (found?.fits !== true) return 'the rates do not factorise.';
  const seen = new Set<string>();
  const balanced = isComplexBalanced({
    ...plain,
    reactions: plain.reactions.map((reaction) => {
      const key = `${reaction.from} ${reaction.to}`;
      const constant = seen.has(key) ? ZERO : found.constants.get(key)!;
      seen.add(key);
      return { ...reaction, constant };
    }),
  });
  if (balanced === null) return new Unconfirmed('powers are too high to multiply out.');
  return balanced === holds ? null : 'the balance says the opposite.';
}

function hasForm(plain: PlainNetwork): boolean {
  return plain.reactions.every(
    ({ massAction, written, from }) =>
      massAction && (!written || [...plain.complexes[from]!.values()].every((amount) => equals(amount, ONE))),
  );
}

interface Factorisation {
  readonly fits: boolean;
  /** Whether a start bounds the counts. */
  readonly bounded: boolean;
  /** v by arrow "from to". */
  readonly constants: ReadonlyMap<string, Rational>;
}

function factorise({ network, plain }: Evidence): Factorisation | null {
  const start = [...network.start.values()].reduce<Rational | null>(
    (sum, { exact }) => sum && exact && add(sum, exact),
    network.start.size === 0 ? null : ZERO,
  );
  const bounded = start !== null && start.denominator === 1n && toDouble(start) <= MOST_UNITS;
  const most = bounded ? toDouble(start) : UNBOUNDED;
  const constants = new Map<string, Rational>();
  for (const site of plain.species) {
    const arrows = arrowsOut(plain, site).filter(({ size }) => size <= most);
    const w: Rational[] = [];
    for (const { key, size } of arrows) {
      for (let n = size; n <= most; n++) {
        const rate = rateOf(network, plain, key, site, size, n);
        if (rate === null) return null;
        if (rate === 'elsewhere' || sign(rate) <= 0) return { fits: false, bounded, constants };
        const own = (w[n] ??= constants.has(key)
          ? divide(multiply(constants.get(key)!, w[n - size] ?? ONE), rate)
          : ONE);
        const v = divide(multiply(rate, own), (w[n - size] ??= ONE));
        if (!constants.has(key)) constants.set(key, v);
        if (!equals(v, constants.get(key)!)) return { fits: false, bounded, constants };
      }
    }
  }
  return { fits: true, bounded, constants };
}

/** Arrows out of a site by "from to" with their sizes, smallest first: the smallest fixes the weight. */
function arrowsOut(plain: PlainNetwork, site: string): { readonly key: string; readonly size: number }[] {
  const sizes = new Map<string, number>();
  for (const { from, to } of plain.reactions) {
    const amount = plain.complexes[from]!.get(site);
    if (amount !== undefined) sizes.set(`${from} ${to}`, toDouble(amount));
  }
  return [...sizes].map(([key, size]) => ({ key, size })).sort((a, b) => a.size - b.size);
}

/** The propensity of an arrow with n units on its site; 'elsewhere' where it changes with the count of another site. */
function rateOf(
  network: Evidence['network'],
  plain: PlainNetwork,
  key: string,
  site: string,
  size: number,
  n: number,
): Rational | 'elsewhere' | null {
  const volume = network.compartments[0]?.volume.exact ?? ONE;
  const counts = rational(BigInt(n));
  let total: Rational = ZERO;
  for (const reaction of plain.reactions) {
    if (`${reaction.from} ${reaction.to}` !== key) continue;
    const law = network.laws[network.reactions.law[reaction.source]!];
    if (law === undefined) {
      let value = reaction.constant;
      for (let k = 0; k < size && value !== null; k++)
        value = divide(multiply(value, rational(BigInt(n - k))), volume);
      if (value === null) return null;
      total = add(total, multiply(value, volume));
      continue;
    }
    const values = [0n, 1n, 2n].map((other) =>
      exactLaw(law.expression, (name) => {
        if (name === site) return divide(counts, volume);
        if (plain.species.includes(name)) return divide(rational(other), volume);
        return network.constants.find((constant) => constant.name === name)?.quantity?.exact ?? null;
      }),
    );
    const known = values.filter((value) => value !== null);
    if (known.some((value) => !equals(value, known[0]!))) return 'elsewhere';
    if (known[0] === undefined) return null;
    total = add(total, multiply(known[0], volume));
  }
  return total;
}

/** A law with the choices of `min` and `max` made first: the innermost call is replaced by the value it has. */
function exactLaw(law: Expression, names: (name: string) => Rational | null): Rational | null {
  const resolved = (part: Expression): Expression | null => {
    switch (part.kind) {
      case 'binary': {
        const left = resolved(part.left);
        const right = resolved(part.right);
        return left && right && { ...part, left, right };
      }
      case 'negate': {
        const of = resolved(part.of);
        return of && { ...part, of };
      }
      case 'call': {
        if (part.name !== 'min' && part.name !== 'max') return null;
        const choices = part.arguments.map(resolved);
        const known = choices.map((choice) => (choice === null ? null : exactValue(choice, names)));
        if (known.includes(null)) return null;
        const order = known.map((_, k) => k).sort((a, b) => compare(known[a]!, known[b]!));
        return choices[part.name === 'min' ? order[0]! : order.at(-1)!]!;
      }
      default:
        return part;
    }
  };
  const plain = resolved(law);
  return plain && exactValue(plain, names);
}

function callsFunctions({ network }: Evidence): boolean {
  const calls = (expression: Expression): boolean => {
    switch (expression.kind) {
      case 'number':
      case 'name':
        return false;
      case 'negate':
        return calls(expression.of);
      case 'binary':
        return calls(expression.left) || calls(expression.right);
      default:
        return true;
    }
  };
  return network.laws.some(({ expression }) => calls(expression));
}
