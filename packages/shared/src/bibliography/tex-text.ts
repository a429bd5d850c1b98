/** Combining marks by the TeX accents that put them over (or under) a letter. */
const accents: Readonly<Record<string, string>> = {
  '`': '\u0300',
  "'": '\u0301',
  '^': '\u0302',
  '~': '\u0303',
  '=': '\u0304',
  u: '\u0306',
  '.': '\u0307',
  '"': '\u0308',
  r: '\u030A',
  H: '\u030B',
  v: '\u030C',
  c: '\u0327',
  k: '\u0328',
};

const letters: Readonly<Record<string, string>> = {
  o: 'ø',
  O: 'Ø',
  l: 'ł',
  L: 'Ł',
  ae: 'æ',
  AE: 'Æ',
  oe: 'œ',
  OE: 'Œ',
  aa: 'å',
  AA: 'Å',
  ss: 'ß',
  i: 'ı',
  j: 'ȷ',
};

/** A letter under an accent: one without its dot gets it back, since the accent takes its place. */
const under = (letter: string): string =>
  letter === 'ı' || letter === '\\i' ? 'i' : letter === '\\j' ? 'j' : letter;

/** Text as BibTeX gives it, as plain text: accents and special letters set, dashes, no braces. */
export function plainOfTex(text: string): string {
  return text
    .replaceAll(
      /\\(?:([`'^~=."])\s*|([urHvck])(?:\s+|(?=\{)))\{?(\\[ij](?![A-Za-z])|\p{L})\}?/gu,
      (_whole, sign: string | undefined, word: string | undefined, letter: string) =>
        under(letter) + (accents[sign ?? word ?? ''] ?? ''),
    )
    .replaceAll(
      /\\(AE|OE|AA|ae|oe|aa|ss|[oOlLij])(?![A-Za-z])\s*/gu,
      (_, name: string) => letters[name] ?? '',
    )
    .replaceAll(/\\([&%$#_{}])/gu, '$1')
    .replaceAll(/\\(?:emph|textit|textbf|textrm|mathrm)(?=\{)/gu, '')
    .replaceAll('---', '—')
    .replaceAll('--', '–')
    .replaceAll('~', '\u00A0')
    .replaceAll(/[{}]/gu, '')
    .replaceAll(/[ \t\r\n]+/gu, ' ')
    .trim()
    .normalize('NFC');
}
