import { execFile } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import type { SparseColumns } from '@stillroom/kernel/exact';

const execute = promisify(execFile);
let built: Promise<string> | null = null;

/** Rank and time of LinBox's sparse elimination, which is compiled on first use into a temporary folder. */
export async function linboxRank(matrix: SparseColumns): Promise<{ rank: number; milliseconds: number }> {
  built ??= build();
  const program = await built;
  const folder = await mkdtemp(join(tmpdir(), 'linbox-'));
  try {
    const file = join(folder, 'matrix.sms');
    await writeFile(file, inSmsFormat(matrix));
    const { stdout } = await execute(program, [file]);
    const [rank, seconds] = stdout.trim().split(' ').map(Number);
    return { rank: rank!, milliseconds: seconds! * 1000 };
  } finally {
    await rm(folder, { recursive: true });
  }
}

async function build(): Promise<string> {
  const program = join(await mkdtemp(join(tmpdir(), 'linbox-')), 'rank');
  const source = fileURLToPath(new URL('linbox-rank.cpp', import.meta.url));
  try {
    const libraries = ['-llinbox', '-lgivaro', '-lopenblas', '-lntl', '-lgmpxx', '-lgmp'];
    await execute('g++', ['-O2', '-march=native', '-o', program, source, ...libraries]);
  } catch (error) {
    throw new Error(
      'LinBox could not be built: it needs g++ and the Debian packages liblinbox-dev and libntl-dev.',
      {
        cause: error,
      },
    );
  }
  return program;
}

/** "rows columns M", then "row column value" from 1, ended by "0 0 0". */
function inSmsFormat(matrix: SparseColumns): string {
  const lines = [`${matrix.rowCount} ${matrix.columnCount} M`];
  for (let column = 0; column < matrix.columnCount; column++) {
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      lines.push(`${matrix.rows[k]! + 1} ${column + 1} ${matrix.values[k]!}`);
    }
  }
  return `${lines.join('\n')}\n0 0 0\n`;
}
