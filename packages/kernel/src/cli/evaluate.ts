import { readFile, writeFile } from 'node:fs/promises';
import { readNotebookFile, type ResultsFile } from '@stillroom/shared/notebook-file';
import { type Arguments, readArguments } from './arguments.ts';
import { CommandLineEngine } from './engine.ts';
import { runNotebook } from './run-notebook.ts';

/** Exit statuses of the command: all cells well, some failed, nothing could be read or written. */
const statuses = { well: 0, failed: 1, unusable: 2 } as const;

/** Ends the command with one sentence on standard error. */
class Unusable extends Error {}

const fileTroubles: Readonly<Record<string, string>> = {
  ENOENT: 'does not exist',
  EISDIR: 'is a folder',
  EACCES: 'may not be read or written by this account',
  ENOSPC: 'does not fit: the disk is full',
  EROFS: 'is on a read-only disk',
};

/** A file system's complaint as a sentence. */
function trouble(error: unknown, file: string): Unusable {
  const code = error instanceof Error && 'code' in error ? String(error.code) : '';
  return new Unusable(
    `${file} ${fileTroubles[code] ?? `cannot be used (${code === '' ? String(error) : code})`}.`,
  );
}

async function readText(file: string): Promise<string> {
  let bytes: Buffer;
  try {
    bytes = await readFile(file);
  } catch (error) {
    throw trouble(error, file);
  }
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    throw new Unusable(`${file} is no text in UTF-8.`);
  }
}

async function writeResults(results: ResultsFile, out: string | null): Promise<void> {
  const text = `${JSON.stringify(results, null, 2)}\n`;
  if (out === null) {
    await new Promise<void>((resolve) => process.stdout.write(text, () => resolve()));
    return;
  }
  try {
    await writeFile(out, text);
  } catch (error) {
    throw trouble(error, out);
  }
}

async function evaluate({ file, cell, out }: Arguments): Promise<number> {
  const read = readNotebookFile(await readText(file));
  if (!read.ok) throw new Unusable(`${file}: ${read.message}`);
  const engine = CommandLineEngine.besideCommandLine();
  try {
    const results = await runNotebook(read.file, cell, (job) => engine.run(job));
    if (results === null) throw new Unusable(`${file} has no cell called ${cell ?? ''}.`);
    await writeResults(results, out);
    const failed = Object.values(results.cells).some(({ status }) => status === 'failed');
    return failed ? statuses.failed : statuses.well;
  } finally {
    await engine.close();
  }
}

async function main(): Promise<void> {
  const given = readArguments(process.argv.slice(2));
  try {
    if (typeof given === 'string') throw new Unusable(given);
    process.exitCode = await evaluate(given);
  } catch (error) {
    process.exitCode = statuses.unusable;
    const words = error instanceof Error ? error.message : String(error);
    process.stderr.write(`${words.replace(/\s*\n\s*/gu, ' ')}\n`);
  }
}

await main();
