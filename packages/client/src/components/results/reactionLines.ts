import type { WrittenArrow } from './familyLines.ts';
import type { NetworkReaction, NetworkResult, Sides } from './shapes.ts';

/** Whether a text writes a family at all; most do not, and load no reader of the notation. */
export const hasFamily = (text: string): boolean => /^\s*\[/mu.test(text);

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
  /** Of a family written as one line: over which indices it runs, and how many reactions it stands for. */
  readonly family?: { readonly over: string; readonly reactions: number | null };
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

/** A constant as a row writes it, with the value that its name has; anything else as written. */
function writtenRate(rate: string | null, result: NetworkResult): ShownRate {
  const constant = result.constants.find(({ name }) => name === rate);
  if (constant !== undefined) return { ...constant, law: null };
  const isName = rate !== null && /^[\p{L}][\p{L}\p{N}_']*(?:\[[^\]]*\])?$/u.test(rate);
  return isName
    ? { name: rate, value: null, unit: null, law: null }
    : { name: null, value: null, unit: null, law: rate ?? '' };
}

/** Lines as they are written: of families, and of a network too long for a list of its reactions. */
export function writtenLines(
  arrows: readonly WrittenArrow[],
  result: NetworkResult,
  notes: readonly string[],
): readonly ReactionLine[] {
  const counts = new Map<number, number>();
  for (const { row } of result.reactions) counts.set(row, (counts.get(row) ?? 0) + 1);
  return arrows.map((arrow, i): ReactionLine => {
    const isFirst = arrows[i - 1]?.row !== arrow.row;
    const { over } = arrow;
    return {
      key: JSON.stringify([arrow.row, i, arrow.from, arrow.to]),
      row: isFirst ? arrow.row : null,
      ofRow: arrow.row,
      from: arrow.from,
      to: arrow.to,
      forward: writtenRate(arrow.rates[0], result),
      backward: arrow.both ? writtenRate(arrow.rates[1], result) : null,
      note: isFirst ? (notes[arrow.row] ?? '') : '',
      ...(over === null ? {} : { family: { over, reactions: counts.get(arrow.row) ?? null } }),
    };
  });
}

/** Lines in which every family stands as the one line that writes it. */
export function withFamilies(
  lines: readonly ReactionLine[],
  written: readonly ReactionLine[],
): readonly ReactionLine[] {
  const families = new Map<number, ReactionLine[]>();
  for (const line of written)
    if (line.family !== undefined) families.set(line.ofRow, [...(families.get(line.ofRow) ?? []), line]);
  const done = new Set<number>();
  return lines.flatMap((line) => {
    const family = families.get(line.ofRow);
    if (family === undefined) return [line];
    if (done.has(line.ofRow)) return [];
    done.add(line.ofRow);
    return family;
  });
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
