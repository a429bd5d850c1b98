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
  /** 0-based row it is of. */
  readonly ofRow: number;
  readonly from: Sides;
  readonly to: Sides;
  readonly forward: ShownRate;
  readonly backward: ShownRate | null;
  readonly note: string;
}

function same(a: Sides, b: Sides): boolean {
  const names = Object.keys(a);
  return names.length === Object.keys(b).length && names.every((name) => a[name] === b[name]);
}

const isBackOf = (next: NetworkReaction | undefined, first: NetworkReaction) =>
  next !== undefined && next.row === first.row && same(next.from, first.to) && same(next.to, first.from);

/** The constant of a mass action rate "kf*E*S": what stands before the powers of its reactants; "" for other laws. */
function leadingConstant(rate: string, from: Sides): string {
  const [name = '', ...factors] = rate.split('*');
  const isReactant = (factor: string) => {
    const power = factor.indexOf('^');
    return Object.hasOwn(from, (power < 0 ? factor : factor.slice(0, power)).trim());
  };
  return factors.every(isReactant) ? name.trim() : '';
}

/**
 * The lines of a scheme: backward reactions join their forward ones, a row's number stands on its first line. Results
 * hold no notes, since a changed note reruns nothing; they come from the text as it stands, by row.
 */
export function reactionLines(result: NetworkResult, notes: readonly string[]): readonly ReactionLine[] {
  const constants = new Map(result.constants.map((constant) => [constant.name, constant]));
  const shown = (rate: string, from: Sides): ShownRate => {
    const constant = constants.get(leadingConstant(rate, from));
    return constant === undefined
      ? { name: null, value: null, unit: null, law: rate }
      : { name: constant.name, value: constant.value, unit: constant.unit, law: null };
  };
  const lines: ReactionLine[] = [];
  const written = new Map<string, number>();
  let above = -1;
  for (let i = 0; i < result.reactions.length; i++) {
    const reaction = result.reactions[i];
    if (reaction === undefined) continue;
    const next = result.reactions[i + 1];
    const back = isBackOf(next, reaction) ? next : undefined;
    // By what it says and not by where it stands: a row put in between leaves those below as they are.
    const says = JSON.stringify([reaction.from, reaction.to, reaction.rate]);
    const again = written.get(says) ?? 0;
    written.set(says, again + 1);
    lines.push({
      key: `${says}${again}`,
      row: reaction.row === above ? null : reaction.row,
      ofRow: reaction.row,
      from: reaction.from,
      to: reaction.to,
      forward: shown(reaction.rate, reaction.from),
      backward: back === undefined ? null : shown(back.rate, back.from),
      note: reaction.row === above ? '' : (notes[reaction.row] ?? ''),
    });
    above = reaction.row;
    if (back !== undefined) i += 1;
  }
  return lines;
}
