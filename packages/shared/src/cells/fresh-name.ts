import type { CellKind } from './kind.ts';
import { cellRegistry } from './registry.ts';

/** A name for a new cell that nothing bears yet: structure1, structure2 …; empty for prose, which needs none. */
export function freshName(kind: CellKind, taken: Iterable<string>): string {
  if (kind === 'prose') return '';
  const used = new Set(taken);
  let number = 1;
  while (used.has(`${cellRegistry[kind].stem}${number}`)) number++;
  return `${cellRegistry[kind].stem}${number}`;
}
