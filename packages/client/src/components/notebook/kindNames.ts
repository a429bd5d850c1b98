import { type CellKind, cellKinds, isCellKind } from '@stillroom/shared/cells';

/** What each kind is called on screen; prose stays in small letters, since it has no slip. */
export const kindNames: Readonly<Record<CellKind, string>> = {
  prose: 'prose',
  network: 'Network',
  structure: 'Structure',
  balance: 'Balance',
  trajectory: 'Trajectory',
  script: 'Script',
  plot: 'Plot',
  claim: 'Claim',
};

/** The same for a kind that a record or a file names. */
export const kindName = (kind: string): string => (isCellKind(kind) ? kindNames[kind] : kind);

/** Kinds by what one wants to do, as the first-run page offers them. */
export const kindGroups: readonly { readonly verb: string; readonly kinds: readonly CellKind[] }[] = [
  { verb: 'Write', kinds: ['prose'] },
  { verb: 'Model', kinds: ['network', 'structure', 'balance'] },
  { verb: 'Run', kinds: ['trajectory'] },
  { verb: 'Weigh', kinds: ['claim'] },
  { verb: 'Else', kinds: ['script', 'plot'] },
];

/** The kinds in the order in which they are offered. */
export const offeredKinds: readonly CellKind[] = cellKinds;
