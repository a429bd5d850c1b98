/** How an engine process is started: the program, what stands before node, and where it finds itself. */
export interface EngineCommand {
  readonly program: string;
  readonly args: readonly string[];
  /** An empty folder. */
  readonly cwd: string;
  readonly env: Readonly<Record<string, string>>;
}

/** Name of the bundled worker in the engine's folder. */
export const workerFile = 'worker.mjs';

/** The permission flag has lost its "experimental" in later versions of Node. */
const permissionFlag = process.allowedNodeEnvironmentFlags.has('--permission')
  ? '--permission'
  : '--experimental-permission';

export interface CommandOptions {
  /** Folder of the bundled engine, readable to the account the process runs under. */
  readonly folder: string;
  readonly cwd: string;
  /** Programs that confine what follows them, each with its arguments. */
  readonly confinements: readonly (readonly string[])[];
  /** Megabytes of JavaScript objects. */
  readonly heap: number;
}

/** Puts a command together: each confinement execs the next, so that the process is node itself in the end. */
export function engineCommand({ folder, cwd, confinements, heap }: CommandOptions): EngineCommand {
  const node = [
    process.execPath,
    permissionFlag,
    `--allow-fs-read=${folder}/*`,
    `--max-old-space-size=${heap}`,
    '--disallow-code-generation-from-strings',
    '--no-warnings',
    `${folder}/${workerFile}`,
  ];
  const [program = process.execPath, ...args] = [...confinements.flat(), ...node];
  return {
    program,
    args,
    cwd,
    env: { PATH: process.env['PATH'] ?? '/usr/bin:/bin', TZ: 'UTC', LANG: 'C.UTF-8' },
  };
}
