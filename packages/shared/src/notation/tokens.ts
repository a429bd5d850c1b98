import { EMPTY_HASH, hashWith, knownWords, LONGEST_KNOWN } from './known-words.ts';

/**
 * The words of the notation, drawn one at a time from a stretch of the text. In a row an arrow is one word and a number
 * has no exponent (`2E1` is two of E1); in an expression `<-` is "less than minus" and `2e1` is twenty.
 */
export type TokenMode = 'row' | 'expression';
export type TokenKind = 'name' | 'number' | 'symbol' | 'unknown' | 'end';

/** Characters that are read as an ASCII symbol. */
const ALIASES: Readonly<Record<string, string>> = {
  '→': '->',
  '←': '<-',
  '⇌': '<=>',
  '∅': '0',
  '−': '-',
  '·': '*',
  '×': '*',
  '≤': '<=',
  '≥': '>=',
  '≠': '!=',
};

const LETTER = /^\p{L}$/u;
const LETTER_OR_MARK = /^[\p{L}\p{M}\p{Nd}]$/u;

const Code = {
  Tab: 9,
  LineFeed: 10,
  Return: 13,
  Space: 32,
  Bang: 33,
  Quote: 39,
  Minus: 45,
  Dot: 46,
  Less: 60,
  Equal: 61,
  Greater: 62,
  Backslash: 92,
  Caret: 94,
  Underscore: 95,
  NoBreakSpace: 0xa0,
} as const;

/** The symbols of one character, by its code; `^` is none in a row. */
const singles: readonly (string | undefined)[] = Array.from({ length: 128 }, (_, code) => {
  const character = String.fromCharCode(code);
  return '+-*/%^()[],=|:<>'.includes(character) ? character : undefined;
});

const isDigit = (code: number) => code >= 48 && code <= 57;
const isAsciiLetter = (code: number) => (code >= 97 && code <= 122) || (code >= 65 && code <= 90);

/** Blank inside a line: a space of any kind, a tab, or the byte order mark. */
export function isBlank(code: number): boolean {
  if (code === Code.Space || code === Code.Tab) return true;
  if (code < Code.NoBreakSpace) return false;
  return (
    code === Code.NoBreakSpace ||
    (code >= 0x2000 && code <= 0x200b) ||
    code === 0x202f ||
    code === 0x3000 ||
    code === 0xfeff
  );
}

/** Where the text goes on after a `\` at `at` that ends its line, or -1 where it is no such sign. */
export function afterContinuation(text: string, at: number): number {
  if (text.charCodeAt(at) !== Code.Backslash) return -1;
  let next = at + 1;
  while (isBlank(text.charCodeAt(next))) next += 1;
  return afterNewline(text, next);
}

/** Where the next line begins when a line ends at `at`, or -1 where it does not. LF, CR LF and CR end a line. */
export function afterNewline(text: string, at: number): number {
  const code = text.charCodeAt(at);
  if (code === Code.LineFeed) return at + 1;
  if (code === Code.Return) return text.charCodeAt(at + 1) === Code.LineFeed ? at + 2 : at + 1;
  return -1;
}

/** Length of the letter, or of the letter, digit or mark, at `at`; 0 where there is none. */
function nameCharacterLength(text: string, at: number, first: boolean): number {
  const code = text.charCodeAt(at);
  if (code < 128) {
    if (isAsciiLetter(code)) return 1;
    return !first && (isDigit(code) || code === Code.Underscore || code === Code.Quote) ? 1 : 0;
  }
  const point = text.codePointAt(at);
  if (point === undefined) return 0;
  const character = String.fromCodePoint(point);
  return (first ? LETTER : LETTER_OR_MARK).test(character) ? character.length : 0;
}

/** Where the name that begins at `at` ends; `at` itself where none begins. */
export function endOfName(text: string, at: number, limit: number): number {
  let length = nameCharacterLength(text, at, true);
  let end = at;
  while (length > 0 && end + length <= limit) {
    end += length;
    length = nameCharacterLength(text, end, false);
  }
  return end;
}

/** A name as it is compared and printed: in NFC. */
export function normalName(name: string): string {
  for (let i = 0; i < name.length; i += 1) if (name.charCodeAt(i) > 127) return name.normalize('NFC');
  return name;
}

/** A place a scanner can go back to. */
export type Mark = number;

/** Reads the words in `from`..`limit`. The current word is `kind`, `from`, `to` and `word`. */
export class Scanner {
  kind: TokenKind = 'end';
  from: number;
  to: number;
  /** The current word: a name in NFC, a symbol in ASCII, else as written. */
  word = '';
  /** Where the word before the current one ended. */
  previousEnd: number;
  mode: TokenMode;
  /** How deep the reader is in brackets, signs and powers; kept here because readers call each other. */
  depth = 0;
  readonly text: string;
  limit: number;

  constructor(text: string, from: number, limit: number, mode: TokenMode) {
    this.text = text;
    this.limit = limit;
    this.mode = mode;
    this.from = from;
    this.to = from;
    this.previousEnd = from;
    this.advance();
  }

  /** Turns to another stretch of the same text, as if made anew. */
  turnTo(from: number, limit: number, mode: TokenMode): this {
    this.limit = limit;
    this.mode = mode;
    this.from = from;
    this.to = from;
    this.depth = 0;
    this.advance();
    return this;
  }

  /** Whether the current word is of this kind. */
  has(kind: TokenKind): boolean {
    return this.kind === kind;
  }

  /** Whether the current word is this symbol. */
  is(symbol: string): boolean {
    return this.kind === 'symbol' && this.word === symbol;
  }

  /** Whether the current word is this name or keyword. */
  isName(name: string): boolean {
    return this.kind === 'name' && this.word === name;
  }

  /** Goes past the current word when it is this symbol, and says whether it did. */
  take(symbol: string): boolean {
    if (!this.is(symbol)) return false;
    this.advance();
    return true;
  }

  mark(): Mark {
    return this.from;
  }

  /** Makes the word that begins at the mark the current one again. */
  reset(mark: Mark, previousEnd: number): void {
    this.to = mark;
    this.advance();
    this.previousEnd = previousEnd;
  }

  advance(): void {
    const { text, limit } = this;
    this.previousEnd = this.to;
    let at = this.to;
    // A single space is by far the most that stands between words.
    if (at < limit && text.charCodeAt(at) === Code.Space) at += 1;
    let code = at < limit ? text.charCodeAt(at) : 0;
    if (code <= Code.Space || code === Code.Backslash || code >= 128) {
      at = this.skipBlanks(at);
      code = at < limit ? text.charCodeAt(at) : 0;
    }
    this.from = at;
    if (at >= limit) this.set('end', limit, '');
    else if (isAsciiLetter(code)) this.readName(at);
    else if (isDigit(code) || (code === Code.Dot && isDigit(text.charCodeAt(at + 1)))) {
      const end = this.endOfNumber(at);
      this.set('number', end, text.slice(at, end));
    } else if (code < 128) this.readSymbol(at, code);
    else this.readBeyondAscii(at);
  }

  /** A name that begins with a letter of ASCII, as most do. */
  private readName(from: number): void {
    const { text, limit } = this;
    let hash = EMPTY_HASH;
    let at = from;
    for (; at < limit; at += 1) {
      const code = text.charCodeAt(at);
      if (!isAsciiLetter(code) && !isDigit(code) && code !== Code.Underscore && code !== Code.Quote) {
        if (code < 128) break;
        const end = endOfName(text, from, limit);
        this.set('name', end, normalName(text.slice(from, end)));
        return;
      }
      hash = hashWith(hash, code);
    }
    const word = at - from > LONGEST_KNOWN ? text.slice(from, at) : knownWords.at(text, from, at, hash);
    this.set('name', at, word);
  }

  private readBeyondAscii(at: number): void {
    const { text, limit } = this;
    const end = endOfName(text, at, limit);
    if (end > at) {
      this.set('name', end, normalName(text.slice(at, end)));
      return;
    }
    const character = String.fromCodePoint(text.codePointAt(at) ?? 0);
    const alias = ALIASES[character];
    if (alias === '0') this.set('number', at + 1, '0');
    else if (alias !== undefined) this.set('symbol', at + 1, alias);
    else this.set('unknown', at + character.length, character);
  }

  private set(kind: TokenKind, to: number, word: string): void {
    this.kind = kind;
    this.to = to;
    this.word = word;
  }

  private skipBlanks(from: number): number {
    let at = from;
    while (at < this.limit) {
      if (isBlank(this.text.charCodeAt(at))) {
        at += 1;
        continue;
      }
      const next = afterContinuation(this.text, at);
      if (next < 0) break;
      at = next;
    }
    return Math.min(at, this.limit);
  }

  private endOfNumber(from: number): number {
    const { text, limit } = this;
    let at = from;
    while (at < limit && isDigit(text.charCodeAt(at))) at += 1;
    const isRange = text.charCodeAt(at + 1) === Code.Dot;
    if (at < limit && text.charCodeAt(at) === Code.Dot && !isRange) {
      at += 1;
      while (at < limit && isDigit(text.charCodeAt(at))) at += 1;
    }
    return this.mode === 'expression' ? this.endOfExponent(at) : at;
  }

  private endOfExponent(at: number): number {
    const { text, limit } = this;
    const letter = text[at];
    if (letter !== 'e' && letter !== 'E') return at;
    const sign = text[at + 1];
    let end = sign === '+' || sign === '-' ? at + 2 : at + 1;
    if (end >= limit || !isDigit(text.charCodeAt(end))) return at;
    while (end < limit && isDigit(text.charCodeAt(end))) end += 1;
    return end;
  }

  /** The longest symbol that begins with a character of ASCII; what is none is unknown. */
  private readSymbol(at: number, code: number): void {
    const symbol =
      this.longSymbol(at, code) ?? (code === Code.Caret && this.mode === 'row' ? undefined : singles[code]);
    if (symbol !== undefined) this.set('symbol', at + symbol.length, symbol);
    else this.set('unknown', at + 1, String.fromCharCode(code));
  }

  private longSymbol(at: number, code: number): string | null {
    const { text, limit } = this;
    if (at + 1 >= limit) return null;
    const next = text.charCodeAt(at + 1);
    if (code === Code.Dot) return next === Code.Dot ? '..' : null;
    if (this.mode === 'row') {
      if (code === Code.Minus) return next === Code.Greater ? '->' : null;
      if (code !== Code.Less) return null;
      if (next === Code.Minus) return '<-';
      const isPair = next === Code.Equal && at + 2 < limit && text.charCodeAt(at + 2) === Code.Greater;
      return isPair ? '<=>' : null;
    }
    if (next !== Code.Equal) return null;
    if (code === Code.Equal) return '==';
    if (code === Code.Bang) return '!=';
    if (code === Code.Less) return '<=';
    return code === Code.Greater ? '>=' : null;
  }
}
