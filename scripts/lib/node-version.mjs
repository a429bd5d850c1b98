import { Complaint } from './words.mjs';

/** Stops on a Node too old, before it fails in words nobody understands. */
export function needNode() {
  const major = Number(process.versions.node.split('.')[0]);
  if (major < 20) throw new Complaint(`Stillroom needs Node 20 or newer; this is ${process.version}.`);
}
