import { parseNetwork } from '../parse.ts';
import { printNetwork } from '../print.ts';

/** Arrows that reaction lists use, with those of the notation: to both sides, to the left, to the right. */
const arrow = /(<[-=]+>|[⇌↔⇄⇋])|(<-+|[←⟵])|([-=]+>|[→⟶⇒])/g;
const zero = /(^|[\s>+-])(?:∅|Ø|\*|null|nothing)(?=$|[\s|<+-])/gi;

/**
 * The canonical text of a list of reactions as people paste them: one a line or separated by `;`, numbered or not, with
 * other arrows, columns separated by tabs. Null where what results is no network: then it is better pasted as it is.
 */
export function textOfReactionList(pasted: string): string | null {
  const lines = pasted
    .split(/[;\r\n]+/)
    .map((line) => line.replace(/^\s*(?:\(?R?\d+[.:)]|[-*•])\s+/i, '').trim())
    .filter((line) => line !== '')
    .map(translate);
  const { tree, complaints } = parseNetwork(lines.join('\n'));
  const hasRows = tree.lines.some((line) => line.kind === 'row');
  return hasRows && complaints.length === 0 ? printNetwork(tree) : null;
}

function translate(line: string): string {
  if (line.startsWith('#')) return line;
  const [reaction = '', ...rest] = line.split(/\t+|\s*\|\s*/);
  const translated = reaction
    .replace(arrow, (_, both?: string, left?: string) => (both ? ' <=> ' : left ? ' <- ' : ' -> '))
    .replace(zero, (_, before: string) => `${before}0`)
    .replace(/\s+/g, ' ')
    .trim();
  return [translated, ...rest].join(' | ');
}
