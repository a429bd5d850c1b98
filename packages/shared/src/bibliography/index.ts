export { readBibtex } from './bibtex.ts';
export type { BibliographyEntry, BibtexMisreading, BibtexReading } from './bibtex.ts';
export { bibliographyOf, citationAt } from './citation.ts';
export type { CitationSpan } from './citation.ts';
export { citationLabel, doiAddress, doiOf, referenceWords } from './words.ts';
export type { ReferenceWords } from './words.ts';
