import type { ArrowSyntax } from '../ast.ts';

/** One directed arrow of a row: from which side to which. */
export interface ArrowPlace {
  readonly from: number;
  readonly to: number;
  readonly arrow: ArrowSyntax;
  /** Which half of a `<=>` it is; null where it stands alone. */
  readonly half: 'forward' | 'backward' | null;
}

/** The directed arrows of a row, left to right, of a `<=>` the one to the right first. */
export function placesOf(arrows: readonly ArrowSyntax[]): ArrowPlace[] {
  const places: ArrowPlace[] = [];
  arrows.forEach((arrow, i) => {
    const isPair = arrow.sign === '<=>';
    if (arrow.sign !== '<-') places.push({ from: i, to: i + 1, arrow, half: isPair ? 'forward' : null });
    if (arrow.sign !== '->') places.push({ from: i + 1, to: i, arrow, half: isPair ? 'backward' : null });
  });
  return places;
}
