import {
  type BibliographyEntry,
  citationAt,
  citationLabel,
  doiAddress,
  doiOf,
  readBibtex,
  referenceWords,
} from '@stillroom/shared/bibliography';
import type { MarkdownIt } from 'markdown-it';

/** Why the BibTeX of a fence cannot be read: said with the line it begins in, counted from 0, and the offset within it. */
export type BibtexTrouble = (message: string, line: number, inside: string, at: number) => never;

/**
 * Teaches the Markdown reader `@[key, …]`, by which works are cited, and fences called bibtex, which become the list of
 * references. A key that this text does not list is left to the page: another prose cell may list it.
 */
export function citationRule(
  markdown: MarkdownIt,
  entries: readonly BibliographyEntry[],
  trouble: BibtexTrouble,
): void {
  const known = new Map(entries.map((entry) => [entry.key, entry]));
  const { escapeHtml } = markdown.utils;

  markdown.inline.ruler.before('escape', 'citation', (state, silent) => {
    const span = citationAt(state.src, state.pos);
    if (span === null) return false;
    if (!silent) state.push('citation', '', 0).meta = { keys: span.keys };
    state.pos = span.to;
    return true;
  });

  const link = (doi: string, words: string): string =>
    `<a href="${escapeHtml(doiAddress(doi))}" rel="noopener noreferrer">${escapeHtml(words)}</a>`;

  function cited(key: string): string {
    const doi = doiOf(key);
    if (doi !== null) return link(doi, `doi:${doi}`);
    const entry = known.get(key);
    const words = entry === undefined ? key : citationLabel(entry);
    return `<span data-cite="${escapeHtml(key)}">${escapeHtml(words)}</span>`;
  }
  markdown.renderer.rules['citation'] = (tokens, index) => {
    const { keys } = tokens[index]?.meta as { keys: readonly string[] };
    return keys.map(cited).join('; ');
  };

  function listed(entry: BibliographyEntry): string {
    const { who, title, where, place, doi } = referenceWords(entry);
    const journal = where === '' ? '' : `<em>${escapeHtml(where)}</em>`;
    const printed = [journal, escapeHtml(place)].filter(Boolean).join(' ');
    const parts = [escapeHtml(who), escapeHtml(title), printed, doi === null ? '' : link(doi, `doi:${doi}`)];
    const sentence = parts
      .filter(Boolean)
      .map((part) => (/[.?!]$/u.test(part) ? part : `${part}.`))
      .join(' ');
    return `<li data-entry="${escapeHtml(entry.key)}">${sentence}</li>`;
  }
  const fence = markdown.renderer.rules.fence;
  markdown.renderer.rules.fence = (tokens, index, options, environment, renderer) => {
    const token = tokens[index];
    if (token?.info.trim() !== 'bibtex') return fence?.(tokens, index, options, environment, renderer) ?? '';
    const reading = readBibtex(token.content);
    if (!reading.ok)
      return trouble(reading.misreading.message, token.map?.[0] ?? 0, token.content, reading.misreading.at);
    return `<ul class="references">\n${reading.entries.map(listed).join('\n')}\n</ul>\n`;
  };
}
