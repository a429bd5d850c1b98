import { functionNames } from '../expression/expression.ts';
import type { FunctionName } from '../expression/expression.ts';

/** The first words of statements. */
export const statementWords = ['start', 'let', 'fix', 'volume', 'in', 'weight', 'event', 'rate'] as const;
export type StatementWord = (typeof statementWords)[number];

/** Words with a meaning of their own that may name nothing else. */
export const keywords: readonly string[] = [
  ...statementWords,
  ...['law', 'net', 'where', 'for', 'when', 'sum', 'and', 'or', 'not'],
];

const keywordSet = new Set<string>(keywords);
const statementSet = new Set<string>(statementWords);
const functionSet = new Set<string>(functionNames);

export const isKeyword = (word: string): boolean => keywordSet.has(word);
export const isStatementWord = (word: string): word is StatementWord => statementSet.has(word);
export const isFunctionName = (word: string): word is FunctionName => functionSet.has(word);

/** Why a word may not name a species or constant, or null where it may. */
export function reservedReason(word: string): string | null {
  if (isKeyword(word)) return `${word} is a word of the notation`;
  if (isFunctionName(word)) return `${word} is a function`;
  if (word === 't') return 't is the time';
  return null;
}
