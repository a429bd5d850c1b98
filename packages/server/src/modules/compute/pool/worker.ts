import { setPriority } from 'node:os';
import { type EngineCommand, EngineProcess } from '@stillroom/kernel/worker';
import type { CellJob, CellKind, CellOutcome } from '@stillroom/shared/cells';
import type { RunOptions, WorkerView } from './types.ts';

/** Priority of runs that take long, as `nice` counts: they get what short ones leave. */
const low = 10;

/** An engine process of the pool, with what the operator sees of it. */
export class Worker {
  readonly process: EngineProcess;
  private busy: { readonly kind: CellKind; readonly since: string; readonly owner: string | null } | null =
    null;
  private spent = false;

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
    if (this.spent) this.process.kill();
    return outcome;
  }

  /**
   * Lets whatever else runs on this machine go first from now on. What has been put back cannot come forward again
   * everywhere, so the process ends after this run.
   */
  putBack(): void {
    this.spent = true;
    try {
      if (this.process.pid !== undefined) setPriority(this.process.pid, low);
    } catch {
      // Gone meanwhile, or the system does not allow it: then it competes as before.
    }
  }

  get free(): boolean {
    return this.busy === null && !this.spent && this.process.usable;
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
