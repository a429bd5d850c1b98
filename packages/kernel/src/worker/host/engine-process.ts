import { type ChildProcess, spawn } from 'node:child_process';
import type { Writable } from 'node:stream';
import type { CellJob, CellOutcome, EndedBy } from '@stillroom/shared/cells';
import {
  type EngineReport,
  type EngineRequest,
  stopPipe,
  type StopReason,
  stopReasons,
} from '@stillroom/shared/protocol';
import type { EngineCommand } from './command.ts';
import { endedOutcome } from './endings.ts';

export interface EngineRunOptions {
  /** Seconds after which the run is ended. */
  readonly deadline: number;
  readonly onProgress?: (progress: { readonly share?: number; readonly words?: string }) => void;
  readonly signal?: AbortSignal;
}

/**
 * Milliseconds that a run is given to leave what it has, after which the process is killed. A script at its deadline gets
 * the least: most scripts that overrun never look up.
 */
const grace: Readonly<Record<StopReason, { readonly script: number; readonly other: number }>> = {
  deadline: { script: 30, other: 400 },
  stop: { script: 200, other: 1000 },
};
/** Milliseconds within which a process has to be ready. */
const startLimit = 20_000;
/** Characters of standard error that are kept, to tell a lack of memory from other ends. */
const mostWords = 4000;

interface Current {
  readonly run: number;
  readonly options: EngineRunOptions;
  readonly finish: (outcome: CellOutcome) => void;
  /** Why it was asked to end, if it was. */
  ending: StopReason | null;
}

/**
 * One engine process, seen from its host: runs one job at a time, ends it at its deadline from outside, and is done for
 * once it has been killed or has broken off.
 */
export class EngineProcess {
  private readonly child: ChildProcess;
  private current: Current | null = null;
  private runs = 0;
  private words = '';
  /** Settled when the process is gone. */
  readonly gone: Promise<void>;
  private alive = true;
  private spent = false;

  private constructor(child: ChildProcess) {
    this.child = child;
    child.stderr?.setEncoding('utf8').on('data', (words: string) => {
      this.words = (this.words + words).slice(-mostWords);
    });
    // A process that has just died refuses what is still on its way; its end is told by "exit".
    child.on('error', () => undefined);
    child.stdio[stopPipe]?.on('error', () => undefined);
    child.on('message', (message) => this.heard(message as EngineReport));
    this.gone = new Promise((resolve) => {
      child.once('exit', (_code, signal) => {
        this.alive = false;
        this.endCurrent(this.endedBy(signal));
        resolve();
      });
    });
  }

  /**
   * Starts a process and waits until it is ready.
   *
   * @throws Error with the words of the process where it does not come up
   */
  static async start(command: EngineCommand): Promise<EngineProcess> {
    const child = spawn(command.program, command.args, {
      cwd: command.cwd,
      env: command.env,
      serialization: 'advanced',
      stdio: ['pipe', 'ignore', 'pipe', 'ipc'],
    });
    const engine = new EngineProcess(child);
    await new Promise<void>((resolve, reject) => {
      const late = setTimeout(() => engine.kill(), startLimit);
      const failed = (why: string) => {
        clearTimeout(late);
        reject(new Error(`The engine process did not start: ${why} ${engine.words}`.trim()));
      };
      child.once('error', (error) => failed(error.message));
      child.once('exit', (code, signal) => failed(`it ended with ${signal ?? code}.`));
      child.once('message', () => {
        clearTimeout(late);
        resolve();
      });
    });
    return engine;
  }

  get pid(): number | undefined {
    return this.child.pid;
  }

  get usable(): boolean {
    return this.alive && !this.spent && !this.child.killed;
  }

  /** Makes ready what scripts need; at once, without waiting for it. */
  warm(): void {
    this.tell({ type: 'warm' });
  }

  /** Runs a job. Never rejects; a run must not be begun before the one before has ended. */
  run(job: CellJob, options: EngineRunOptions): Promise<CellOutcome> {
    if (!this.usable) return Promise.resolve(endedOutcome('crash', options.deadline));
    return new Promise((resolve) => {
      const run = ++this.runs;
      let killing: NodeJS.Timeout | undefined;
      const end = (reason: StopReason) => {
        if (this.current?.run !== run || this.current.ending !== null) return;
        this.current.ending = reason;
        this.orderStop(reason, run);
        killing = setTimeout(
          () => {
            // A killed process computes no more, however long the system takes to clear it away.
            this.kill();
            this.endCurrent(reason);
          },
          grace[reason][job.kind === 'script' ? 'script' : 'other'],
        );
      };
      const stop = () => end('stop');
      const timer = setTimeout(() => end('deadline'), options.deadline * 1000);
      options.signal?.addEventListener('abort', stop, { once: true });
      const finish = (outcome: CellOutcome) => {
        clearTimeout(timer);
        clearTimeout(killing);
        options.signal?.removeEventListener('abort', stop);
        this.current = null;
        resolve(outcome);
      };
      this.current = { run, options, finish, ending: null };
      this.tell({ type: 'run', run, job });
      if (options.signal?.aborted === true) stop();
    });
  }

  /** Ends the process at once. */
  kill(): void {
    this.child.kill('SIGKILL');
  }

  private tell(request: EngineRequest): void {
    if (this.child.connected) this.child.send(request);
  }

  private orderStop(reason: StopReason, run: number): void {
    const order = Buffer.alloc(5);
    order[0] = stopReasons[reason];
    order.writeUInt32LE(run, 1);
    (this.child.stdio[stopPipe] as Writable | null)?.write(order);
  }

  private heard(message: EngineReport): void {
    if (message.type === 'ready' || this.current?.run !== message.run) return;
    if (message.type === 'done') {
      this.spent ||= message.last;
      this.current.finish(message.outcome);
      return;
    }
    this.current.options.onProgress?.({
      ...(message.progress === undefined ? {} : { share: message.progress }),
      ...(message.words === undefined ? {} : { words: message.words }),
    });
  }

  /** Why the process is gone: what it was asked, else what its end looks like. */
  private endedBy(signal: NodeJS.Signals | null): EndedBy {
    if (this.current?.ending !== null && this.current?.ending !== undefined) return this.current.ending;
    const memory =
      signal === 'SIGABRT' || signal === 'SIGKILL' || /out of memory|allocation failed/iu.test(this.words);
    return memory ? 'memory' : 'crash';
  }

  private endCurrent(by: EndedBy): void {
    this.current?.finish(endedOutcome(by, this.current.options.deadline));
  }
}
