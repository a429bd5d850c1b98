import type { CellKind } from '../cells/kind.ts';
import { type CanonicalLines, canonicalText } from '../notation/canonical.ts';

/** What no database and no JSON reader takes everywhere. */
const unreadable = /[\p{Surrogate}\0]/gu;
// Begun only where no blank stands before: from every blank of a long run on, it would cost the square of the run.
const trailingBlanks = /(?<![^\S\n])[^\S\n]+$/gmu;

/** A text as every digest sees it: NFC, lines ended by LF, no blanks at the ends of lines. */
export function plainText(text: string): string {
  return text
    .replace(/\r\n?/gu, '\n')
    .replace(trailingBlanks, '')
    .replace(unreadable, '\uFFFD')
    .normalize('NFC');
}

/**
 * The text of a cell as digested and as the engine gets it. For a network that can be read it is the canonical print
 * without comments and notes, so that changing those reruns nothing; where it cannot be read, the text itself.
 * `lines`: what earlier versions of a network have left to be used again.
 */
export function sourceText(kind: CellKind, text: string, lines?: CanonicalLines): string {
  const plain = plainText(text);
  return kind === 'network' ? (canonicalText(plain, lines) ?? plain) : plain;
}
