import { spawnSync } from 'node:child_process';
import {
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  renameSync,
  rmSync,
  chmodSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createHash } from 'node:crypto';
import { type EngineCommand, engineCommand, workerFile } from './command.ts';
import { EngineProcess } from './engine-process.ts';

export interface IsolationOptions {
  /** Folder of the bundled engine. */
  readonly folder: string;
  /** Where a copy may be put for an account that cannot read `folder`; by default the system's folder for passing files. */
  readonly stateFolder?: string;
  /** Bytes a process may use, buffers and WebAssembly counted. */
  readonly memory: number;
}

/** How engine processes are kept from the rest of the machine. */
export interface Isolation {
  readonly command: EngineCommand;
  /** What holds and what does not, for the operator. */
  readonly words: string;
  /** Whether everything holds. */
  readonly whole: boolean;
}

interface Wall {
  /** What it keeps out, to be said when it stands, and when it does not. */
  readonly stands: string;
  readonly missing: string;
  /** Ways to raise it, strongest first. */
  readonly ways: readonly (readonly string[])[];
}

/** The account of nobody: it owns nothing and no service runs under it that a process could disturb. */
const nobody = '65534';

function walls(memory: number): readonly Wall[] {
  const root = process.getuid?.() === 0;
  return [
    {
      stands: 'no network',
      missing: 'the network is within reach, since this system lets nobody make a network of their own',
      ways: root ? [['unshare', '-n', '--']] : [['unshare', '-r', '-n', '--']],
    },
    {
      stands: root ? 'an account without rights' : 'no new rights',
      missing: 'the rights of this account',
      ways: root
        ? [['setpriv', '--reuid', nobody, '--regid', nobody, '--clear-groups', '--no-new-privs']]
        : [['setpriv', '--no-new-privs']],
    },
    {
      stands: `at most ${Math.round(memory / 1024 / 1024)} MB each`,
      missing: 'no ceiling on buffers',
      ways: [['prlimit', `--data=${memory}`]],
    },
  ];
}

/** Whether a confinement works here: asked by trying it on a program that does nothing. */
function works(way: readonly string[]): boolean {
  const [program = 'true', ...args] = way;
  return spawnSync(program, [...args, 'true'], { cwd: '/', stdio: 'ignore', timeout: 5000 }).status === 0;
}

/** Whether a confined process can read the engine. */
function canRead(confinements: readonly (readonly string[])[], folder: string): boolean {
  return [join(folder, workerFile), process.execPath].every((file) =>
    works([...confinements.flat(), 'test', '-r', file, '-a']),
  );
}

/** Copies the engine to where every account can read it; a copy of the same bytes is used again. */
function readableCopy(folder: string, stateFolder: string): string {
  const hash = createHash('sha256')
    .update(readFileSync(join(folder, workerFile)))
    .digest('hex')
    .slice(0, 16);
  const copy = join(stateFolder, `stillroom-engine-${hash}`);
  if (existsSync(join(copy, workerFile))) return copy;
  mkdirSync(stateFolder, { recursive: true });
  const half = mkdtempSync(`${copy}-`);
  cpSync(folder, half, { recursive: true });
  chmodSync(half, 0o755);
  try {
    renameSync(half, copy);
  } catch (error) {
    rmSync(half, { recursive: true, force: true });
    if (!existsSync(join(copy, workerFile))) throw error;
  }
  return copy;
}

function emptyFolder(): string {
  const folder = join(tmpdir(), 'stillroom-empty');
  mkdirSync(folder, { recursive: true, mode: 0o755 });
  return folder;
}

interface Raised {
  readonly confinements: readonly (readonly string[])[];
  readonly standing: readonly string[];
  readonly missing: readonly string[];
}

function raise(all: readonly Wall[]): Raised {
  return all.reduce<Raised>(
    ({ confinements, standing, missing }, wall) => {
      const way = wall.ways.find((one) => works([...confinements.flat(), ...one]));
      return way === undefined
        ? { confinements, standing, missing: [...missing, wall.missing] }
        : { confinements: [...confinements, way], standing: [...standing, wall.stands], missing };
    },
    { confinements: [], standing: [], missing: [] },
  );
}

const sentence = (parts: readonly string[]): string => parts.join(', ');

function inWords({ standing, missing }: Raised): string {
  const held = sentence([...standing, 'no files, no other programs']);
  const words = missing.length === 0 ? `${held}.` : `${held}; but ${sentence(missing)}.`;
  return words.replace(/^./u, (first) => first.toUpperCase());
}

async function starts(command: EngineCommand): Promise<boolean> {
  try {
    const engine = await EngineProcess.start(command);
    engine.kill();
    await engine.gone;
    return true;
  } catch {
    return false;
  }
}

/**
 * Finds out how engine processes can be confined on this machine, by trying: no network, an account without rights, no
 * new rights, a ceiling on memory that counts buffers and WebAssembly, and always Node's own permission flags. What
 * cannot be had is left out and said.
 *
 * @throws Error where no engine process starts at all
 */
export async function findIsolation({
  folder,
  stateFolder = tmpdir(),
  memory,
}: IsolationOptions): Promise<Isolation> {
  const heap = Math.max(64, Math.floor(memory / 1024 / 1024 / 2));
  const cwd = emptyFolder();
  const raised = raise(walls(memory));
  const readable = canRead(raised.confinements, folder) ? folder : readableCopy(folder, stateFolder);
  const command = engineCommand({ folder: readable, cwd, confinements: raised.confinements, heap });
  if (await starts(command)) return { command, words: inWords(raised), whole: raised.missing.length === 0 };
  const bare = raise([]);
  const weakest = engineCommand({ folder, cwd, confinements: [], heap });
  const engine = await EngineProcess.start(weakest);
  engine.kill();
  const missing = walls(memory).map((wall) => wall.missing);
  return { command: weakest, words: inWords({ ...bare, missing }), whole: false };
}
