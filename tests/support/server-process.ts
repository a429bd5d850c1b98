import { type ChildProcess, fork } from 'node:child_process';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../..', import.meta.url));

export interface ServerProcess {
  readonly port: number;
  readonly pid: number;
  /** Ends the process as a crash or a power cut would, and waits until it is gone. */
  kill(): Promise<void>;
}

/** Starts a real server as a process of its own, from its source, on a database that is migrated. */
export async function startServerProcess(settings: Readonly<Record<string, string>>): Promise<ServerProcess> {
  const child = fork('packages/server/src/main.ts', {
    cwd: root,
    execArgv: ['--import', 'tsx', '--conditions=development'],
    env: {
      PATH: process.env['PATH'],
      TSX_TSCONFIG_PATH: 'tsconfig.base.json',
      SESSION_SECRET: 'a secret for tests only, long enough to pass',
      RATE_FACTOR: '1000',
      LOG_LEVEL: 'warn',
      ...settings,
    },
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
  });
  const port = await ready(child);
  const gone = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  return {
    port,
    pid: child.pid ?? 0,
    async kill() {
      child.kill('SIGKILL');
      await gone;
    },
  };
}

function ready(child: ChildProcess): Promise<number> {
  return new Promise((resolve, reject) => {
    child.once('message', (message: { ready?: boolean; port?: number; failed?: string }) => {
      if (message.ready === true && message.port !== undefined) resolve(message.port);
      else reject(new Error(message.failed ?? 'The server did not start.'));
    });
    child.once('exit', (code) => reject(new Error(`The server ended with ${code} before it was ready.`)));
  });
}
