import { performance } from 'node:perf_hooks';

/** Something the person at the terminal can do something about: printed as it stands, without a stack. */
export class Complaint extends Error {}

const began = performance.now();
let terminal = process.stdout;
const dim = (words) => (terminal.isTTY ? `\x1b[2m${words}\x1b[0m` : words);

/** From now on progress is told on standard error: for commands whose standard output is a result. */
export function sayOnStandardError() {
  terminal = process.stderr;
}

/** A progress line with the seconds since the start. */
export function say(words) {
  const seconds = ((performance.now() - began) / 1000).toFixed(1).padStart(6);
  terminal.write(`${dim(`${seconds} s`)}  ${words}\n`);
}

/** Words without a time: headlines and endings. */
export function tell(words = '') {
  process.stdout.write(`${words}\n`);
}

/** Runs a script's main function; what goes wrong ends it with one sentence where one is known. */
export async function main(work) {
  try {
    await work();
  } catch (error) {
    process.exitCode = 1;
    process.stderr.write(`\n${inWords(error)}\n`);
  }
}

/** An error as its reader needs it: one sentence where one is known, else everything. */
export function inWords(error) {
  if (error instanceof Complaint) return error.message;
  if (error?.code === 'ENOSPC') return 'The disk is full. Free some space and start again; nothing was lost.';
  if (error?.code === 'EROFS')
    return `The folder of ${error.path} is read-only; Stillroom must be able to write there.`;
  if (error?.code === 'EACCES' && error.path)
    return `This account may not write ${error.path}; change its owner, or start as that owner.`;
  return error?.stack ?? String(error);
}
