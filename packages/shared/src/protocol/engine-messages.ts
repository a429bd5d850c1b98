import type { CellJob, CellOutcome } from '../cells/cell.ts';

/** What a host says to an engine process; a run is asked for only when the one before is done. */
export type EngineRequest =
  | { readonly type: 'run'; readonly run: number; readonly job: CellJob }
  /** Makes ready what scripts need, while there is nothing else to do. */
  | { readonly type: 'warm' };

/** What an engine process says to its host. */
export type EngineReport =
  | { readonly type: 'ready' }
  | {
      readonly type: 'progress';
      readonly run: number;
      /** Share done, 0..1, where it is known. */
      readonly progress?: number;
      readonly words?: string;
    }
  | {
      readonly type: 'done';
      readonly run: number;
      readonly outcome: CellOutcome;
      /** The process has grown too large to run another; it ends by itself. */
      readonly last: boolean;
    };

/**
 * A run is asked to end by one byte on this pipe, standard input, since a computing process reads no messages: at the next
 * checkpoint it leaves what it has. The byte says why; it counts for the run whose number follows as four bytes,
 * little-endian.
 */
export const stopPipe = 0;
export const stopReasons = { deadline: 1, stop: 2 } as const;
export type StopReason = keyof typeof stopReasons;
