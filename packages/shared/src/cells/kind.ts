/** Every cell kind of the product, in the order in which they are offered. */
export const cellKinds = [
  'prose',
  'network',
  'structure',
  'balance',
  'trajectory',
  'script',
  'plot',
  'claim',
] as const;
export type CellKind = (typeof cellKinds)[number];

export const isCellKind = (value: unknown): value is CellKind => cellKinds.some((kind) => kind === value);
