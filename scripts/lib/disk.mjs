import { statfsSync } from 'node:fs';
import { Complaint } from './words.mjs';

/** Stops before a start that would run out of disk half way. @param {number} megabytes needed at least */
export function needSpace(folder, megabytes) {
  const { bavail, bsize } = statfsSync(folder);
  const free = Math.floor((bavail * bsize) / 1e6);
  if (free >= megabytes) return;
  throw new Complaint(
    `The disk of ${folder} is full: ${free} MB are free and ${megabytes} MB are needed. Free some space, then start again.`,
  );
}
