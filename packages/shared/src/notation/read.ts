import type { NotationReading } from './complaint.ts';
import { Complaints } from './complaints.ts';
import { elaborate } from './elaborate/elaborate.ts';
import { parseTree } from './parse.ts';

/**
 * Reads a network text: parses it and turns it into a network. Never throws; `network` is null where an error stands in
 * the way. Complaints are in order of position.
 */
export function readNetwork(text: string): NotationReading {
  const complaints = new Complaints(text);
  const tree = parseTree(text, complaints);
  const network = elaborate(tree, complaints);
  return { network, complaints: complaints.list() };
}
