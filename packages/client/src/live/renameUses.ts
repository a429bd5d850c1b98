import type { CellKind } from '@stillroom/shared/cells';

/** One replacement in a text, offsets in UTF-16 units of the text before any of them. */
export interface TextEdit {
  readonly from: number;
  readonly to: number;
  readonly insert: string;
}

const escaped = (name: string) => name.replaceAll(/[.*+?^${}()|[\]\\]/gu, '\\$&');

/** Quoted words and comments of a script or a claim, which never name a cell. */
const quoted = /"(?:[^"\\\n]|\\.)*"|'(?:[^'\\\n]|\\.)*'|\/\/[^\n]*|\/\*[\s\S]*?\*\//gu;

/** Blanks out what is quoted, keeping every offset. Template strings stay: their `${…}` may use a cell. */
const withoutQuoted = (text: string) => text.replaceAll(quoted, (part) => ' '.repeat(part.length));

function found(text: string, pattern: RegExp, name: string, to: string): TextEdit[] {
  return [...text.matchAll(pattern)].map((match) => {
    const from = match.index + match[0].lastIndexOf(name);
    return { from, to: from + name.length, insert: to };
  });
}

/**
 * Where the text of a cell speaks of another cell by name, as replacements that make it say `to`; in text order.
 * Settings are not looked at: `mapReferences` follows those.
 */
export function renameUses(kind: CellKind, text: string, name: string, to: string): TextEdit[] {
  const word = escaped(name);
  switch (kind) {
    case 'claim':
      return found(
        withoutQuoted(text),
        new RegExp(`(?<![\\p{L}\\p{N}_.])${word}(?=\\s*[.[])`, 'gu'),
        name,
        to,
      );
    case 'script':
      return found(
        withoutQuoted(text),
        new RegExp(`(?<![\\p{L}\\p{N}_$.])${word}(?![\\p{L}\\p{N}_$])(?!\\s*:(?!:))`, 'gu'),
        name,
        to,
      );
    case 'prose':
      return [
        ...found(text, new RegExp(`=\\[\\s*${word}(?=\\s*[.[,\\]])`, 'gu'), name, to),
        ...found(text, new RegExp(`\\]\\(#${word}(?=\\))`, 'gu'), name, to),
      ].sort((a, b) => a.from - b.from);
    case 'plot':
      return found(text, new RegExp(`"name"\\s*:\\s*"${word}(?=")`, 'gu'), name, to);
    default:
      return [];
  }
}
