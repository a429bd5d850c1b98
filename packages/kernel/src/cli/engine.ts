import { fileURLToPath } from 'node:url';
import type { CellJob, CellOutcome } from '@stillroom/shared/cells';
import { EngineProcess, findIsolation } from '../worker/index.ts';

/** Seconds a cell may take, and bytes. */
const deadline = 60;
const memory = 1536 * 1024 * 1024;

/** One engine process, replaced whenever a run had to be ended. */
export class CommandLineEngine {
  private readonly folder: string;
  private process: Promise<EngineProcess> | null = null;

  /** @param folder of the bundled worker */
  constructor(folder: string) {
    this.folder = folder;
  }

  /** The folder that the build puts beside the command line. */
  static besideCommandLine(): CommandLineEngine {
    return new CommandLineEngine(fileURLToPath(new URL('../worker', import.meta.url)));
  }

  /** Runs a job in a process of its own account and without network, as far as the system allows. Never rejects. */
  async run(job: CellJob): Promise<CellOutcome> {
    this.process ??= this.start();
    const engine = await this.process;
    const outcome = await engine.run(job, { deadline });
    if (!engine.usable) this.process = null;
    return outcome;
  }

  async close(): Promise<void> {
    const engine = await this.process;
    engine?.kill();
    await engine?.gone;
  }

  private async start(): Promise<EngineProcess> {
    const { command } = await findIsolation({ folder: this.folder, memory });
    return EngineProcess.start(command);
  }
}
