import type { Completion, CompletionContext, CompletionResult } from '@codemirror/autocomplete';
import type { Text } from '@codemirror/state';
import { barsOf, isRow, withoutComment } from './ledgerLines.ts';

const nameAt = /[\p{L}][\p{L}\p{N}_']*$/u;
const names = /\p{L}[\p{L}\p{N}_']*/gu;
const givenName = /(\p{L}[\p{L}\p{N}_']*)(?:\[[^\]]*\])?\s*=/gu;

const statements: readonly Completion[] = [
  { label: 'start', detail: 'where the species begin', type: 'keyword' },
  { label: 'let', detail: 'a named value or an output', type: 'keyword' },
  { label: 'fix', detail: 'hold a species constant', type: 'keyword' },
  { label: 'volume', detail: 'turn amounts into counts', type: 'keyword' },
  { label: 'in', detail: 'place species in a volume', type: 'keyword' },
  { label: 'weight', detail: 'rate as a function of the count', type: 'keyword' },
  { label: 'event when', detail: 'set values when something turns true', type: 'keyword' },
  { label: 'rate', detail: 'a species that follows an equation', type: 'keyword' },
];

const units: readonly Completion[] = [
  '/s',
  '/min',
  '/h',
  '/uM/s',
  '/uM/min',
  'uM/s',
  'uM',
  'nM',
  'mM',
  'M',
  's',
  'min',
  'h',
].map((label) => ({ label, type: 'unit' }));

/** Species, in the reaction column of every row, and constants, in the second; each once, in order of appearance. */
export function wordsOf(doc: Text): { species: string[]; constants: string[] } {
  const species = new Set<string>();
  const constants = new Set<string>();
  for (const line of doc.iterLines()) {
    const [reaction = '', second = ''] = withoutComment(line).split('|');
    if (isRow(line)) {
      for (const [name] of reaction.replace(/^\s*\[[^\]]*\]/u, '').matchAll(names)) species.add(name);
      for (const [, name] of second.matchAll(givenName)) if (name !== undefined) constants.add(name);
    } else if (/^\s*let\b/u.test(line)) {
      for (const [, name] of line.matchAll(givenName)) if (name !== undefined) constants.add(name);
    }
  }
  constants.delete('law');
  constants.delete('net');
  return { species: [...species], constants: [...constants] };
}

/** What may stand where one types in a network: statements, species, constants, units. */
export function notationCompletion(context: CompletionContext): CompletionResult | null {
  const line = context.state.doc.lineAt(context.pos);
  const before = line.text.slice(0, context.pos - line.from);
  if (before.includes('#')) return null;
  const afterNumber = /\d\s+(\/?[a-zA-Z/]*)$/u.exec(before);
  const column = barsOf(before).length;
  if (afterNumber !== null && (column === 1 || !isRow(line.text)))
    return {
      from: context.pos - (afterNumber[1]?.length ?? 0),
      options: [...units],
      validFor: /^\/?[a-zA-Z/]*$/u,
    };
  const word = nameAt.exec(before)?.[0];
  if (word === undefined && !context.explicit) return null;
  const from = context.pos - (word?.length ?? 0);
  if (column >= 2) return null;
  const { species, constants } = wordsOf(context.state.doc);
  // The word being typed is in the text already; offering it back would only stand in the way.
  const known = (list: readonly string[], type: string, detail: string): Completion[] =>
    list.filter((label) => label !== word).map((label) => ({ label, type, detail }));
  const atBegin = before.slice(0, before.length - (word?.length ?? 0)).trim() === '';
  const options = [
    ...(column === 0 ? known(species, 'variable', 'species') : []),
    ...(column === 1 || !isRow(line.text) ? known(constants, 'constant', 'constant') : []),
    ...(column === 1
      ? known(species, 'variable', 'species').map((option) => ({ ...option, boost: -1 }))
      : []),
    ...(atBegin ? statements : []),
  ];
  return options.length === 0 ? null : { from, options, validFor: /^[\p{L}\p{N}_']*$/u };
}
