import { type Path, type PathStep, printPath } from './path.ts';

/** A value found in a result, or a sentence on where the path leaves it. */
export type Resolution =
  | { readonly found: true; readonly value: unknown }
  | { readonly found: false; readonly message: string; readonly hint: string | null };

const mostListed = 12;

function listed(keys: readonly string[]): string | null {
  if (keys.length === 0) return null;
  const shown = keys.slice(0, mostListed).join(', ');
  return keys.length > mostListed
    ? `It has ${shown} and ${keys.length - mostListed} more.`
    : `It has ${shown}.`;
}

function missing(place: string, value: unknown, step: PathStep): Resolution {
  const missed = (message: string, hint: string | null = null): Resolution => ({
    found: false,
    message,
    hint,
  });
  if (Array.isArray(value)) {
    if (typeof step === 'string') {
      return missed(`${place} is a list, so it has no ${step}.`, `Write ${place}[0] for its first entry.`);
    }
    return missed(
      `${place} has ${value.length} ${value.length === 1 ? 'entry' : 'entries'}, so there is no [${step}].`,
      'Entries are counted from 0.',
    );
  }
  if (typeof value === 'object' && value !== null) {
    const keys = Object.keys(value);
    const indexed = keys.find((known) => known.startsWith(`${step}[`));
    return missed(
      `${place} has no ${step}.`,
      indexed === undefined
        ? listed(keys)
        : `An indexed name is written in quotes: ${place}[${JSON.stringify(indexed)}].`,
    );
  }
  return missed(`${place} is ${value === null ? 'undecided' : 'a single value'}, so it has no ${step}.`);
}

/** Follows the steps of a path through the JSON result of its cell. Only own members count. */
export function resolvePath(result: unknown, path: Pick<Path, 'head' | 'steps'>): Resolution {
  let value = result;
  for (const [depth, step] of path.steps.entries()) {
    const has = Array.isArray(value)
      ? typeof step === 'number' && step < value.length
      : typeof value === 'object' && value !== null && Object.hasOwn(value, step);
    if (!has) return missing(printPath(path.head, path.steps.slice(0, depth)), value, step);
    value = (value as Record<PathStep, unknown>)[step];
  }
  return { found: true, value };
}
