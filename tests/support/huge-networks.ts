import type { Network } from '@stillroom/shared/network';

/** A network with reversible isomerisations P_i <=> Q_i beside it, `count` of them, made directly. */
export function withIsomerisations(base: Network, count: number): Network {
  const { complexes, reactions, species } = base;
  const more = Int32Array.from({ length: 2 * count }, (_, i) => i);
  const none = more.map(() => -1);
  const joined = (a: Int32Array, b: Int32Array): Int32Array => Int32Array.from([...a, ...b]);
  return {
    ...base,
    rows: [
      ...base.rows,
      ...Array.from({ length: count }, (_, i) => ({
        line: base.rows.length + i + 1,
        note: '',
        reactions: 2,
        family: false,
      })),
    ],
    species: [...species, ...Array.from(more, (i) => `${i % 2 === 0 ? 'P' : 'Q'}${i >> 1}`)],
    complexes: {
      count: complexes.count + 2 * count,
      offsets: joined(
        complexes.offsets,
        more.map((i) => complexes.species.length + i + 1),
      ),
      species: joined(
        complexes.species,
        more.map((i) => species.length + i),
      ),
      numerators: Float64Array.from([...complexes.numerators, ...more.map(() => 1)]),
      denominators: null,
    },
    reactions: {
      count: reactions.count + 2 * count,
      from: joined(
        reactions.from,
        more.map((i) => complexes.count + i),
      ),
      to: joined(
        reactions.to,
        more.map((i) => complexes.count + (i ^ 1)),
      ),
      row: joined(
        reactions.row,
        more.map((i) => base.rows.length + (i >> 1)),
      ),
      constant: joined(reactions.constant, none),
      law: joined(reactions.law, none),
      partner: joined(reactions.partner, none),
    },
  };
}
