import { type EngineCommand, EngineProcess } from '@stillroom/kernel/worker';
import type { CellJob, CellKind, CellOutcome } from '@stillroom/shared/cells';
import type { RunOptions, WorkerView } from './types.ts';

/** An engine process of the pool, with what the operator sees of it. */
export class Worker {
  readonly process: EngineProcess;
  private busy: { readonly kind: CellKind; readonly since: string; readonly owner: string | null } | null =
    null;

  private constructor(process: EngineProcess) {
    this.process = process;
  }

  static async start(command: EngineCommand): Promise<Worker> {
    const process = await EngineProcess.start(command);
    process.warm();
    return new Worker(process);
  }

  async run(job: CellJob, options: RunOptions): Promise<CellOutcome> {
    this.busy = { kind: job.kind, since: new Date().toISOString(), owner: options.owner ?? null };
    options.onBegin?.();
    const outcome = await this.process.run(job, options);
    this.busy = null;
    return outcome;
  }

  get free(): boolean {
    return this.busy === null && this.process.usable;
  }

  view(): WorkerView {
    return {
      id: String(this.process.pid ?? ''),
      state: this.busy === null ? 'idle' : 'working',
      kind: this.busy?.kind ?? null,
      since: this.busy?.since ?? null,
      owner: this.busy?.owner ?? null,
    };
  }
}
