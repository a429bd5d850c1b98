import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type EngineCommand, engineCommand, workerFile } from './command.ts';
import { EngineProcess } from './engine-process.ts';
import { readableCopy } from './readable-copy.ts';

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
  readonly against: 'network' | 'account' | 'memory';
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
      against: 'network',
      stands: 'no network',
      missing: 'the network is within reach, since this system lets nobody make a network of their own',
      ways: root ? [['unshare', '-n', '--']] : [['unshare', '-r', '-n', '--']],
    },
    {
      against: 'account',
      stands: root ? 'an account without rights' : 'no new rights',
      missing: 'the rights of this account',
      ways: root
        ? [['setpriv', '--reuid', nobody, '--regid', nobody, '--clear-groups', '--no-new-privs']]
        : [['setpriv', '--no-new-privs']],
    },
    {
      against: 'memory',
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

/** Raises those walls that can be raised here; `without` leaves some out, which then count as missing. */
function raise(all: readonly Wall[], without: readonly Wall['against'][]): Raised {
  return all.reduce<Raised>(
    ({ confinements, standing, missing }, wall) => {
      const ways = without.includes(wall.against) ? [] : wall.ways;
      const way = ways.find((one) => works([...confinements.flat(), ...one]));
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

/** @throws Error with the words of the process where it does not come up */
async function mustStart(command: EngineCommand): Promise<void> {
  const engine = await EngineProcess.start(command);
  engine.kill();
  await engine.gone;
}

/** What is given up, step by step, where a process does not start with everything: an account may lack rights it needs. */
const concessions: readonly (readonly Wall['against'][])[] = [
  [],
  ['account'],
  ['account', 'network', 'memory'],
];

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
  if (!existsSync(join(folder, workerFile)))
    throw new Error(`The engine has not been built: ${folder} holds none.`);
  const heap = Math.max(64, Math.floor(memory / 1024 / 1024 / 2));
  const cwd = emptyFolder();
  let trouble: unknown = null;
  for (const without of concessions) {
    const raised = raise(walls(memory), without);
    try {
      const readable = canRead(raised.confinements, folder) ? folder : readableCopy(folder, stateFolder);
      const command = engineCommand({ folder: readable, cwd, confinements: raised.confinements, heap });
      await mustStart(command);
      return { command, words: inWords(raised), whole: raised.missing.length === 0 };
    } catch (error) {
      trouble = error;
    }
  }
  throw trouble;
}
