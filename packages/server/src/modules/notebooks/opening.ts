import type { NotebookContent } from '@stillroom/shared/document';

const length = 160;
/** How much of a cell is looked at, in UTF-16 units: unclosed brackets cost the square of it. */
const lookedAt = 8000;

/** First words of the first prose cell, as plain text: without headings, marks of Markdown and TeX. */
export function openingOf({ cells }: Pick<NotebookContent, 'cells'>): string {
  for (const { kind, text } of cells) {
    if (kind !== 'prose') continue;
    const words = plainWords(text.slice(0, lookedAt));
    if (words !== '') return shorten(words);
  }
  return '';
}

function plainWords(text: string): string {
  return text
    .replace(/```.*?(?:```|$)/gsu, ' ')
    .replace(/\$\$.*?(?:\$\$|$)/gsu, ' … ')
    .split('\n')
    .filter((line) => !/^\s*(#|>|!\[|\|)/u.test(line))
    .map((line) => line.replace(/^\s*(?:[-*+]|\d+[.)])\s+/u, ''))
    .join(' ')
    .replace(/=\[[^\]]*\]/gu, '…')
    .replace(/!?\[([^\]]*)\]\([^)]*\)/gu, '$1')
    .replace(/\$([^$]+)\$/gu, (_whole, tex: string) => plainMathematics(tex))
    .replace(/[*`]|(?<!\w)_|_(?!\w)/gu, '')
    .replace(/\s+/gu, ' ')
    .trim();
}

const greek =
  'alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi omicron pi rho . sigma tau upsilon phi chi psi omega'.split(
    ' ',
  );
const signs: Readonly<Record<string, string>> = {
  ...Object.fromEntries(greek.map((name, i) => [name, String.fromCodePoint(0x3b1 + i)])),
  ...Object.fromEntries(
    greek.map((name, i) => [name[0]?.toUpperCase() + name.slice(1), String.fromCodePoint(0x391 + i)]),
  ),
  varepsilon: 'ε',
  vartheta: 'ϑ',
  varphi: 'φ',
  le: '≤',
  leq: '≤',
  ge: '≥',
  geq: '≥',
  ne: '≠',
  neq: '≠',
  approx: '≈',
  times: '×',
  cdot: '·',
  to: '→',
  rightarrow: '→',
  rightleftharpoons: '⇌',
  infty: '∞',
  in: '∈',
  pm: '±',
  ldots: '…',
  dots: '…',
};

/** TeX within a line as it can be read without being set: letters and signs as themselves, commands left out. */
function plainMathematics(tex: string): string {
  return tex
    .replace(/\\frac\s*\{([^{}]*)\}\s*\{([^{}]*)\}/gu, '$1/$2')
    .replace(/\\([A-Za-z]+)/gu, (_whole, name: string) => signs[name] ?? '')
    .replace(/\\./gu, ' ')
    .replace(/[{}_^]/gu, '');
}

function shorten(words: string): string {
  if (words.length <= length) return words;
  const cut = words.slice(0, length);
  return `${cut.slice(0, Math.max(cut.lastIndexOf(' '), length - 20))}…`;
}
