import type * as z from 'zod/mini';
import type { CellSettings } from './cell.ts';
import { claimSettings } from './claim.ts';
import type { CellKind } from './kind.ts';
import { plotSettings } from './plot.ts';
import { proseSettings } from './prose.ts';
import { scriptSettings } from './script.ts';
import { networkSettings } from './network.ts';
import { balanceSettings } from './settings.ts';
import { structureSettings } from './structure.ts';
import { trajectorySettings } from './trajectory.ts';

/** A place in settings that names another cell; `*` stands for every entry of a list. */
export interface SettingReference {
  readonly at: readonly string[];
  /** The kind that must stand there; null: any. */
  readonly kind: CellKind | null;
  /** Whether the drawing cell needs that cell's result, or its source is enough. */
  readonly reads: 'source' | 'result';
  /** Whether the result speaks of that cell by its name, so that another name makes another result. */
  readonly named?: true;
}

/** All that is common to the cells of one kind. */
export interface CellKindEntry {
  readonly kind: CellKind;
  /** Base of the names given to new cells: "run" makes run1, run2 … */
  readonly stem: string;
  readonly settings: z.ZodMiniType<CellSettings>;
  /** What a new cell holds. */
  readonly empty: { readonly text: string; readonly settings: CellSettings };
  readonly references: readonly SettingReference[];
}

const onNetwork: readonly SettingReference[] = [{ at: ['network'], kind: 'network', reads: 'source' }];

/** One entry a kind; adding a kind is its file, a name in `cellKinds`, and a line here. */
export const cellRegistry: Readonly<Record<CellKind, CellKindEntry>> = {
  prose: {
    kind: 'prose',
    stem: 'prose',
    settings: proseSettings,
    empty: { text: '', settings: {} },
    references: [],
  },
  network: {
    kind: 'network',
    stem: 'network',
    settings: networkSettings,
    empty: { text: '', settings: {} },
    references: [],
  },
  structure: {
    kind: 'structure',
    stem: 'structure',
    settings: structureSettings,
    empty: { text: '', settings: { network: '' } },
    references: [...onNetwork, { at: ['compare', '*'], kind: 'network', reads: 'source', named: true }],
  },
  balance: {
    kind: 'balance',
    stem: 'balance',
    settings: balanceSettings,
    empty: { text: '', settings: { network: '' } },
    references: onNetwork,
  },
  trajectory: {
    kind: 'trajectory',
    stem: 'run',
    settings: trajectorySettings,
    empty: { text: '', settings: { network: '', until: 10 } },
    references: onNetwork,
  },
  script: {
    kind: 'script',
    stem: 'script',
    settings: scriptSettings,
    empty: { text: '', settings: { draws: [] } },
    references: [{ at: ['draws', '*'], kind: null, reads: 'result', named: true }],
  },
  plot: {
    kind: 'plot',
    stem: 'plot',
    settings: plotSettings,
    empty: { text: '', settings: { draw: [], mark: 'line' } },
    references: [{ at: ['draw', '*', 'cell'], kind: null, reads: 'result' }],
  },
  claim: {
    kind: 'claim',
    stem: 'claim',
    settings: claimSettings,
    empty: { text: '', settings: {} },
    references: [],
  },
};
