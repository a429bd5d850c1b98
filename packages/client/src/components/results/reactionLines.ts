import type { NetworkReaction, NetworkResult, Sides } from './shapes.ts';

/** A rate as it is shown: a named constant with its value, or a law as written. */
export interface ShownRate {
  readonly name: string | null;
  readonly value: number | null;
  readonly unit: string | null;
  readonly law: string | null;
}

/** One line of a scheme: an arrow, or a pair of them. */
export interface ReactionLine {
  readonly key: string;
  /** 0-based row; null where the line above is of the same row. */
  readonly row: number | null;
  readonly from: Sides;
  readonly to: Sides;
  readonly forward: ShownRate;
  readonly backward: ShownRate | null;
  readonly note: string;
}

const same = (a: Sides, b: Sides) =>
  JSON.stringify(Object.entries(a).sort()) === JSON.stringify(Object.entries(b).sort());

const isBackOf = (next: NetworkReaction | undefined, first: NetworkReaction) =>
  next !== undefined && next.row === first.row && same(next.from, first.to) && same(next.to, first.from);

/** The lines of a scheme: backward reactions join their forward ones, a row's number stands on its first line. */
export function reactionLines(result: NetworkResult): readonly ReactionLine[] {
  const constants = new Map(result.constants.map((constant) => [constant.name, constant]));
  const shown = (rate: string): ShownRate => {
    const constant = constants.get(rate);
    return constant === undefined
      ? { name: null, value: null, unit: null, law: rate }
      : { name: constant.name, value: constant.value, unit: constant.unit, law: null };
  };
  const lines: ReactionLine[] = [];
  let above = -1;
  for (let i = 0; i < result.reactions.length; i++) {
    const reaction = result.reactions[i];
    if (reaction === undefined) continue;
    const next = result.reactions[i + 1];
    const back = isBackOf(next, reaction) ? next : undefined;
    lines.push({
      key: `${i}`,
      row: reaction.row === above ? null : reaction.row,
      from: reaction.from,
      to: reaction.to,
      forward: shown(reaction.rate),
      backward: back === undefined ? null : shown(back.rate),
      note: reaction.row === above ? '' : reaction.note,
    });
    above = reaction.row;
    if (back !== undefined) i += 1;
  }
  return lines;
}
