import { type BibliographyEntry, readBibtex } from './bibtex.ts';

/** `@[feinberg1987, 10.1000/182]` in prose: works cited by the key of a BibTeX entry or by DOI. */
export interface CitationSpan {
  readonly keys: readonly string[];
  readonly to: number;
}

/** The citation that begins at a place in a text; null where none does. */
export function citationAt(text: string, at: number): CitationSpan | null {
  if (!text.startsWith('@[', at)) return null;
  const end = text.indexOf(']', at);
  const inside = end < 0 ? '' : text.slice(at + 2, end);
  const keys = inside.split(/\s*;\s*|,\s+/u).map((key) => key.trim());
  return end < 0 || keys.some((key) => !/^[^\s@]+$/u.test(key)) ? null : { keys, to: end + 1 };
}

/** Fences that hold BibTeX. */
const fence =
  /^(?<open>`{3,}|~{3,})[ \t]*bibtex[ \t]*\r?\n(?<inside>[\s\S]*?)(?:^\k<open>[`~]*[ \t]*$|(?![\s\S]))/gmu;

/** The works that a prose text lists in its fences called bibtex; a fence that cannot be read lists none. */
export function bibliographyOf(prose: string): readonly BibliographyEntry[] {
  if (!prose.includes('bibtex')) return [];
  return [...prose.matchAll(fence)].flatMap(({ groups }) => {
    const reading = readBibtex(groups?.['inside'] ?? '');
    return reading.ok ? reading.entries : [];
  });
}
