import { findReferences } from '../cells/references.ts';
import { cellRegistry } from '../cells/registry.ts';
import type { CellSettings } from '../cells/cell.ts';
import type { CellKind } from '../cells/kind.ts';
import { claimPaths, parseClaim } from '../paths/claim-expression.ts';
import { findWoven } from '../paths/prose-spans.ts';

/** A cell drawn on by name, where it is named, and what is asked of it. */
export interface Draw {
  readonly name: string;
  /** Offset in the text; null where settings name it. */
  readonly at: number | null;
  /** The kind it must be of; null: any. */
  readonly kind: CellKind | null;
  readonly reads: 'source' | 'result';
  /** Whether the name itself is part of what is computed. */
  readonly named: boolean;
}

type TextDraw = Pick<Draw, 'name'> & { readonly at: number };

function wovenDraws(text: string): TextDraw[] {
  return findWoven(text).flatMap(({ woven, from }) =>
    woven.ok ? [{ name: woven.value.path.head, at: from + 2 + woven.value.path.from }] : [],
  );
}

function claimDraws(text: string): TextDraw[] {
  const claim = parseClaim(text);
  return claim.ok ? claimPaths(claim.value).map(({ head, from }) => ({ name: head, at: from })) : [];
}

/** So many names of a specification are looked up in its text: each costs a search of the whole. */
const mostPlaced = 200;

/** Names of the data of a Vega-Lite specification, wherever they stand in it. */
function specificationDraws(text: string): TextDraw[] {
  let specification: unknown;
  try {
    specification = JSON.parse(text);
  } catch {
    return [];
  }
  const own = new Set<string>();
  const found = new Map<string, TextDraw>();
  const walk = (value: unknown): void => {
    if (typeof value !== 'object' || value === null) return;
    for (const [key, inner] of Object.entries(value)) {
      if (key === 'datasets' && typeof inner === 'object' && inner !== null) {
        Object.keys(inner).forEach((name) => own.add(name));
        continue;
      }
      const data = key === 'data' && typeof inner === 'object' && inner !== null ? inner : null;
      const name = data !== null && 'name' in data && !('values' in data) ? data.name : null;
      if (typeof name === 'string' && !found.has(name)) {
        const at = found.size < mostPlaced ? text.indexOf(JSON.stringify(name)) : 0;
        found.set(name, { name: name.normalize('NFC'), at: Math.max(0, at) });
      }
      walk(inner);
    }
  };
  walk(specification);
  return [...found.values()].filter(({ name }) => !own.has(name));
}

const textDraws: Partial<Record<CellKind, (text: string) => TextDraw[]>> = {
  prose: wovenDraws,
  claim: claimDraws,
  plot: specificationDraws,
};

/** Every cell that a cell draws on, each name once, in order of first mention: settings first, then the text. */
export function findDraws(kind: CellKind, text: string, settings: CellSettings): Draw[] {
  const draws = new Map<string, Draw>();
  const replaced = kind === 'plot' && text.trim() !== '';
  const references = replaced ? [] : findReferences(cellRegistry[kind], settings);
  for (const { name, kind: wanted, reads, named = false } of references) {
    const spelt = name.normalize('NFC');
    if (!draws.has(spelt)) draws.set(spelt, { name: spelt, at: null, kind: wanted, reads, named });
  }
  for (const { name, at } of textDraws[kind]?.(text) ?? []) {
    if (!draws.has(name)) draws.set(name, { name, at, kind: null, reads: 'result', named: true });
  }
  return [...draws.values()];
}
