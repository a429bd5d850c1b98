import type { CellSettings } from './cell.ts';
import type { CellKindEntry, SettingReference } from './registry.ts';

/** A name found in settings, and what the kind asks of the cell that bears it. */
export interface FoundReference extends Omit<SettingReference, 'at'> {
  readonly name: string;
}

/** Rebuilds `value` with `change` applied to every string at the place `at`; shares whatever does not change. */
function mapAt(value: unknown, at: readonly string[], change: (name: string) => unknown): unknown {
  const [step, ...rest] = at;
  if (step === undefined) return typeof value === 'string' ? change(value) : value;
  if (step === '*') return Array.isArray(value) ? value.map((entry) => mapAt(entry, rest, change)) : value;
  if (typeof value !== 'object' || value === null || !Object.hasOwn(value, step)) return value;
  return { ...value, [step]: mapAt((value as CellSettings)[step], rest, change) };
}

/** Replaces every name of a cell in settings; used to follow a rename and to make digests. */
export function mapReferences(
  entry: CellKindEntry,
  settings: CellSettings,
  change: (name: string) => unknown,
): CellSettings {
  return entry.references.reduce((made, { at }) => mapAt(made, at, change) as CellSettings, settings);
}

/** The names of cells in settings, in order, empty ones included. */
export function findReferences(entry: CellKindEntry, settings: CellSettings): FoundReference[] {
  return entry.references.flatMap(({ at, ...asked }) => {
    const found: FoundReference[] = [];
    mapAt(settings, at, (name) => {
      found.push({ name, ...asked });
      return name;
    });
    return found;
  });
}
