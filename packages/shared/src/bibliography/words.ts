import type { BibliographyEntry } from './bibtex.ts';

interface Person {
  readonly family: string;
  /** Given names as initials: "R. A.". */
  readonly initials: string;
}

/** Families whose names begin with these keep them: "van der Waals". */
const particles = /^(?:van|von|der|den|de|del|di|da|la|le|ten|ter|zu)$/iu;

function personOf(name: string): Person {
  const [family = '', given] = name.includes(',') ? name.split(/\s*,\s*/u) : splitName(name);
  const initials = (given ?? '')
    .split(/[\s.]+/u)
    .filter(Boolean)
    .map((word) =>
      word
        .split('-')
        .map((part) => `${[...part][0] ?? ''}.`)
        .join('-'),
    )
    .join(' ');
  return { family: family.trim(), initials };
}

/** "Ludwig van der Waals" → family, given. */
function splitName(name: string): readonly [string, string] {
  const words = name.split(/\s+/u);
  let family = words.length - 1;
  while (family > 1 && particles.test(words[family - 1] ?? '')) family -= 1;
  return [words.slice(family).join(' '), words.slice(0, family).join(' ')];
}

function peopleOf({ fields }: BibliographyEntry): readonly Person[] {
  const names = fields['author'] ?? fields['editor'] ?? '';
  return names
    .split(/\s+and\s+/u)
    .filter((name) => name !== '' && name !== 'others')
    .map(personOf);
}

const othersFollow = ({ fields }: BibliographyEntry): boolean =>
  /\sand\s+others$/u.test(fields['author'] ?? fields['editor'] ?? '');

/** At most so many authors are named where a work is cited; the list of references names all. */
const namedAtMost = 3;

/** How a work is cited in a sentence: "Horn, Jackson 1972". */
export function citationLabel(entry: BibliographyEntry): string {
  const people = peopleOf(entry).map(({ family }) => family);
  const named = people.length === 0 ? [entry.fields['title'] ?? entry.key] : people.slice(0, namedAtMost);
  const others = people.length > namedAtMost || othersFollow(entry) ? ' and others' : '';
  return [`${named.join(', ')}${others}`, entry.fields['year'] ?? ''].filter(Boolean).join(' ');
}

/** The parts of a line in a list of references, to be set apart by type. */
export interface ReferenceWords {
  readonly who: string;
  readonly title: string;
  /** Journal, book or publisher, set in italic. */
  readonly where: string;
  /** Volume, pages. */
  readonly place: string;
  readonly doi: string | null;
}

/** A work as a list of references gives it. */
export function referenceWords(entry: BibliographyEntry): ReferenceWords {
  const { fields } = entry;
  const people = peopleOf(entry).map(({ family, initials }) => [family, initials].filter(Boolean).join(' '));
  const names = `${people.join(', ')}${othersFollow(entry) ? ' and others' : ''}`;
  const number = fields['number'] === undefined ? '' : `(${fields['number']})`;
  return {
    who: [names, fields['year'] ?? ''].filter(Boolean).join(' '),
    title: fields['title'] ?? '',
    where: fields['journal'] ?? fields['booktitle'] ?? fields['publisher'] ?? fields['school'] ?? '',
    place: [`${fields['volume'] ?? ''}${number}`, fields['pages'] ?? ''].filter(Boolean).join(', '),
    doi: doiOf(fields['doi'] ?? ''),
  };
}

/** A digital object identifier without what stands before it; null where there is none. */
export function doiOf(text: string): string | null {
  const found = /^(?:https?:\/\/(?:dx\.)?doi\.org\/|doi:\s*)?(10\.\d{4,9}\/\S+)$/iu.exec(text.trim());
  return found?.[1] ?? null;
}

/** Where a digital object identifier leads. */
export const doiAddress = (doi: string): string =>
  `https://doi.org/${encodeURIComponent(doi).replaceAll('%2F', '/')}`;
