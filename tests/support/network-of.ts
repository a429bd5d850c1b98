import type { Expression } from '@stillroom/shared/expression';
import type { Network, NetworkEvent, Quantity } from '@stillroom/shared/network';

/** A reaction as the tables of reference values state it: `kr` makes it reversible, `law` replaces mass action. */
export interface PlainReaction {
  readonly from: Readonly<Record<string, number>>;
  readonly to: Readonly<Record<string, number>>;
  readonly k?: number;
  readonly kr?: number;
  readonly law?: Expression;
}

export interface PlainNetwork {
  readonly reactions: readonly PlainReaction[];
  readonly initial?: Readonly<Record<string, number>>;
  readonly constants?: Readonly<Record<string, number | null>>;
  readonly fixed?: Readonly<Record<string, number>>;
  readonly outputs?: Readonly<Record<string, Expression>>;
  readonly events?: readonly NetworkEvent[];
  readonly rateRules?: Readonly<Record<string, Expression>>;
  readonly compartments?: readonly {
    readonly name: string;
    readonly volume: number;
    readonly species: readonly string[];
  }[];
}

export const quantity = (value: number): Quantity => ({ value, exact: null });
export const num = (value: number): Expression => ({ kind: 'number', value });
export const name = (text: string): Expression => ({ kind: 'name', name: text });
export const binary = (
  left: Expression,
  operator: '+' | '-' | '*' | '/' | '%' | '^',
  right: Expression,
): Expression => ({
  kind: 'binary',
  operator,
  left,
  right,
});
export const compare = (
  left: Expression,
  operator: '==' | '!=' | '<' | '<=' | '>' | '>=',
  right: Expression,
): Expression => ({ kind: 'compare', operator, left, right });

/** A Network made without the notation. Constants of reactions are called k1, k2, … in order of writing. */
export function networkOf(plain: PlainNetwork): Network {
  const species: string[] = [];
  const speciesIndex = (text: string): number => {
    const known = species.indexOf(text);
    return known >= 0 ? known : species.push(text) - 1;
  };
  const complexes: [number, number][][] = [];
  const keys = new Map<string, number>();
  const complexIndex = (side: Readonly<Record<string, number>>): number => {
    const parts = Object.entries(side).map<[number, number]>(([text, n]) => [speciesIndex(text), n]);
    parts.sort((a, b) => a[0] - b[0]);
    const key = JSON.stringify(parts);
    const known = keys.get(key);
    if (known !== undefined) return known;
    keys.set(key, complexes.length);
    return complexes.push(parts) - 1;
  };
  const constants: { name: string; quantity: Quantity | null; unit: null; line: number }[] = [];
  const laws: { expression: Expression; net: boolean; massAction: null }[] = [];
  const table: { from: number; to: number; row: number; constant: number; law: number; partner: number }[] =
    [];
  plain.reactions.forEach((reaction, row) => {
    const from = complexIndex(reaction.from);
    const to = complexIndex(reaction.to);
    if (reaction.law !== undefined) {
      const law = laws.push({ expression: reaction.law, net: false, massAction: null }) - 1;
      table.push({ from, to, row, constant: -1, law, partner: -1 });
      return;
    }
    for (const [k, a, b] of [
      [reaction.k, from, to],
      [reaction.kr, to, from],
    ] as const) {
      if (k === undefined) continue;
      const constant =
        constants.push({
          name: `k${constants.length + 1}`,
          quantity: quantity(k),
          unit: null,
          line: row + 1,
        }) - 1;
      table.push({ from: a, to: b, row, constant, law: -1, partner: -1 });
    }
  });
  for (const [text, value] of Object.entries(plain.constants ?? {})) {
    constants.push({ name: text, quantity: value === null ? null : quantity(value), unit: null, line: 1 });
  }
  const bySpecies = <T, U>(
    record: Readonly<Record<string, T>> | undefined,
    map: (value: T) => U,
  ): Map<number, U> =>
    new Map(Object.entries(record ?? {}).map(([text, value]) => [speciesIndex(text), map(value)]));
  const rateRules = bySpecies(plain.rateRules, (expression) => expression);
  const start = bySpecies(plain.initial, quantity);
  const fixed = bySpecies(plain.fixed, quantity);
  const offsets = new Int32Array(complexes.length + 1);
  complexes.forEach((parts, index) => (offsets[index + 1] = offsets[index]! + parts.length));
  const column = (pick: (entry: (typeof table)[number]) => number): Int32Array =>
    Int32Array.from(table, pick);
  return {
    species,
    complexes: {
      count: complexes.length,
      offsets,
      species: Int32Array.from(complexes.flat(), ([index]) => index),
      numerators: Float64Array.from(complexes.flat(), ([, n]) => n),
      denominators: null,
    },
    reactions: {
      count: table.length,
      from: column(({ from }) => from),
      to: column(({ to }) => to),
      row: column(({ row }) => row),
      constant: column(({ constant }) => constant),
      law: column(({ law }) => law),
      partner: column(({ partner }) => partner),
    },
    rows: plain.reactions.map((_, index) => ({ line: index + 1, note: '', reactions: 1, family: false })),
    constants,
    laws,
    start,
    fixed,
    outputs: Object.entries(plain.outputs ?? {}).map(([text, expression]) => ({ name: text, expression })),
    weights: new Map(),
    events: plain.events ?? [],
    rateRules,
    compartments: (plain.compartments ?? []).map(({ name: text, volume, species: members }) => ({
      name: text,
      volume: quantity(volume),
      unit: null,
      species: members.map(speciesIndex),
    })),
    units: { time: null, amount: null, volume: null },
  };
}
