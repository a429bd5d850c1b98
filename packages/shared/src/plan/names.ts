import { isCellName } from '../cells/name.ts';
import type { CellError } from '../protocol/messages.ts';
import type { PlannableCell } from './plan.ts';

/** Who bears which name (NFC), in document order. */
export type Bearers = ReadonlyMap<string, readonly PlannableCell[]>;

/** Collects the bearers of every name; cells without a name are left out. */
export function bearersOf(cells: readonly PlannableCell[]): Bearers {
  const bearers = new Map<string, PlannableCell[]>();
  for (const cell of cells) {
    const name = cell.name.normalize('NFC');
    if (name === '') continue;
    const same = bearers.get(name);
    if (same === undefined) bearers.set(name, [cell]);
    else same.push(cell);
  }
  return bearers;
}

/** Why a cell cannot go by its name; null where it can. Prose may go without one. */
export function nameProblem(cell: PlannableCell, bearers: Bearers): CellError | null {
  const name = cell.name.normalize('NFC');
  if (name === '') {
    return cell.kind === 'prose'
      ? null
      : {
          message: `This ${cell.kind} has no name.`,
          hint: 'Give it one, so that other cells can draw on it.',
        };
  }
  if (!isCellName(name)) {
    return {
      message: `"${name}" cannot be the name of a cell.`,
      hint: 'A name is a letter, then letters, digits or _.',
    };
  }
  const same = bearers.get(name)?.length ?? 0;
  if (same < 2) return null;
  return {
    message: `${same === 2 ? 'Two' : same} cells are called ${name}.`,
    hint: 'Give this one or the other another name.',
  };
}
