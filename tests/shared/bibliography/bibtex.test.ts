import {
  bibliographyOf,
  citationAt,
  citationLabel,
  doiOf,
  readBibtex,
  referenceWords,
} from '@stillroom/shared/bibliography';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';

const text = `
A comment between entries.
@string{ces = "Chem. Eng. Sci."}
@article{feinberg1987,
  author = {Feinberg, Martin},
  title = {Chemical reaction network structure and the stability of complex isothermal reactors---{I}},
  journal = ces, volume = 42, number = {10}, pages = "2229--2268", year = 1987,
  doi = {https://doi.org/10.1016/0009-2509(87)80099-4},
}
@Article(mueller2016,
  author = "M{\\"u}ller, S. and Feliu, Elisenda and Regensburger, Georg and Conradi, Carsten",
  title = {Sign conditions for injectivity}, year = {2016})
@book{waals, author = {Johannes Diderik van der Waals and others}, title = "Over de continu\\"{\\i}teit", publisher = "Sijthoff" # {, Leiden}, year = 1873}
`;
const entries = () => {
  const reading = readBibtex(text);
  if (!reading.ok) throw new Error(reading.misreading.message);
  return reading.entries;
};

describe('BibTeX', () => {
  test('entries in braces or brackets, values in braces, quotes, numbers, strings and joined parts', () => {
    const [first, second, third] = entries();
    expect(first).toMatchObject({ key: 'feinberg1987', type: 'article' });
    expect(first?.fields).toMatchObject({ journal: 'Chem. Eng. Sci.', volume: '42', pages: '2229–2268' });
    expect(second?.fields['author']).toMatch(/^Müller, S\. and Feliu/u);
    expect(third?.fields).toMatchObject({ title: 'Over de continuïteit', publisher: 'Sijthoff, Leiden' });
  });

  test.each([
    ['@article{a, title = {open', 'not closed by }'],
    ['@article{, title = 1}', 'no key'],
    ['@article{a, title = word}', 'no string is called that'],
    ['@article{a, year = 1} @book{a, year = 2}', 'Two entries are called a.'],
    ['@article a', 'begins with {'],
    ['@article{a, title {x}}', 'no value by ='],
  ])('%s cannot be read, in words', (wrong, words) => {
    const reading = readBibtex(wrong);
    expect(reading.ok ? '' : reading.misreading.message).toContain(words);
  });

  test('whatever stands there is read or refused in words', () => {
    fc.assert(
      fc.property(fc.string({ unit: fc.constantFrom(...'@a{}(),="#\\ \n12~"') }), (given) => {
        const reading = readBibtex(given);
        return reading.ok || reading.misreading.at <= given.length;
      }),
      { seed: 7, numRuns: 2000 },
    );
  });
});

describe('words of a work', () => {
  test('a citation names up to three authors and the year', () => {
    expect(entries().map(citationLabel)).toEqual([
      'Feinberg 1987',
      'Müller, Feliu, Regensburger and others 2016',
      'van der Waals and others 1873',
    ]);
  });

  test('a reference names all, with what is printed where', () => {
    expect(referenceWords(entries()[0]!)).toEqual({
      who: 'Feinberg M. 1987',
      title: 'Chemical reaction network structure and the stability of complex isothermal reactors—I',
      where: 'Chem. Eng. Sci.',
      place: '42(10), 2229–2268',
      doi: '10.1016/0009-2509(87)80099-4',
    });
  });

  test.each([
    ['10.1000/182', '10.1000/182'],
    ['doi:10.1000/182', '10.1000/182'],
    ['https://doi.org/10.1000/182', '10.1000/182'],
    ['feinberg1987', null],
  ])('%s as a DOI is %s', (given, doi) => expect(doiOf(given)).toBe(doi));
});

describe('in prose', () => {
  test('a citation holds keys and DOIs with a comma and a blank, or a semicolon, between', () => {
    expect(citationAt('as @[a1, 10.1000/x,y; b] says', 3)).toEqual({
      keys: ['a1', '10.1000/x,y', 'b'],
      to: 24,
    });
    expect(citationAt('@[]', 0)).toBeNull();
    expect(citationAt('@[two words]', 0)).toBeNull();
    expect(citationAt('[a]', 0)).toBeNull();
  });

  test('works are listed in fences called bibtex', () => {
    const prose = `# One\n\n\`\`\`bibtex\n@book{a, title = "A"}\n\`\`\`\n\n\`\`\`\n@book{b, title = "B"}\n\`\`\`\n`;
    expect(bibliographyOf(prose).map(({ key }) => key)).toEqual(['a']);
  });
});
