import type { NotationReading } from '@stillroom/shared/notation';
import type { ScriptEngine } from '../script/script-engine.ts';

/** Thrown by `checkpoint` when the run is to end. A cell that has part of its result catches it and leaves that. */
export class StopRequested extends Error {
  /** Whether the time was up, or a person asked. */
  readonly by: 'deadline' | 'stop';

  constructor(by: 'deadline' | 'stop') {
    super(by === 'deadline' ? 'The time allowed is over.' : 'The run was stopped.');
    this.name = 'StopRequested';
    this.by = by;
  }
}

/** What an evaluation is given besides its job; nothing in it may change a result that is complete. */
export interface EngineControl {
  /**
   * To be called often (at least every few milliseconds of work; it is cheap): tells how far the run is and throws
   * `StopRequested` when it is to end.
   *
   * @param progress share done, 0..1, where it is known
   * @param words what is being done, in a few words
   */
  checkpoint(progress?: number, words?: string): void;
  /** Reads a network text; a host may remember readings. */
  readonly readNetwork?: (text: string) => NotationReading;
  /** What runs scripts; without it script cells fail with words. */
  readonly scripts?: ScriptEngine;
}
