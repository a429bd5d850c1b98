import { type Expression, freeNames, partsOf, printExpression } from '@stillroom/shared/expression';
import type { Network } from '@stillroom/shared/network';

/** A place where a rate may jump. */
export interface RateJump {
  /** "the law of line 3", "the rate of X". */
  readonly where: string;
  /** What decides it, as written: "S > 1", "floor(S)". */
  readonly what: string;
}

/**
 * Where rates may jump as the course goes on, at a moment that moves with some of the constants `by` (indices): there forward
 * sensitivities miss the part that an event would give them. A condition on the time alone moves only with the constants
 * in it; `min`, `max` and `abs` have a kink and no jump.
 */
export function sensitivityJumps(network: Network, by: ReadonlySet<number>): RateJump[] {
  const moves = movingNames(network, by);
  const jumps: RateJump[] = [];
  const seen = new Set<string>();
  const search = (where: string, expression: Expression): void => {
    const deciding = decider(expression);
    if (deciding !== null && freeNames(deciding).some(moves)) {
      const what = printExpression(deciding);
      if (!seen.has(`${where}: ${what}`)) jumps.push({ where, what });
      seen.add(`${where}: ${what}`);
    }
    for (const part of partsOf(expression)) if (part !== deciding) search(where, part);
  };
  const { reactions, laws, rows } = network;
  for (let r = 0; r < reactions.count; r++) {
    const law = laws[reactions.law[r]!];
    if (law !== undefined) search(`the law of line ${rows[reactions.row[r]!]!.line}`, law.expression);
  }
  for (const [species, expression] of network.rateRules)
    search(`the rate of ${network.species[species]!}`, expression);
  return jumps;
}

/** What a part of an expression jumps by, null where it does not. */
function decider(expression: Expression): Expression | null {
  switch (expression.kind) {
    case 'compare':
    case 'logic':
    case 'not':
      return expression;
    case 'binary':
      return expression.operator === '%' ? expression : null;
    case 'call':
      if (expression.name === 'if') return expression.arguments[0] ?? null;
      return ['floor', 'ceil', 'round'].includes(expression.name) ? expression : null;
    default:
      return null;
  }
}

/** Whether a name stands for something that moves along the course in a way that depends on the constants. */
function movingNames(network: Network, by: ReadonlySet<number>): (name: string) => boolean {
  const species = new Set(network.species.filter((_name, index) => !network.fixed.has(index)));
  const constants = new Set([...by].map((index) => network.constants[index]!.name));
  const outputs = new Map(network.outputs.map(({ name, expression }) => [name, expression]));
  const known = new Map<string, boolean>();
  const moves = (name: string): boolean => {
    const before = known.get(name);
    if (before !== undefined) return before;
    known.set(name, false);
    const expression = outputs.get(name);
    const found =
      species.has(name) ||
      constants.has(name) ||
      (expression !== undefined && freeNames(expression).some(moves));
    known.set(name, found);
    return found;
  };
  return moves;
}
