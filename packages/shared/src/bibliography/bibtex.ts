import { plainOfTex } from './tex-text.ts';

/** One work of a bibliography. Fields by name in small letters, their TeX set as plain text. */
export interface BibliographyEntry {
  readonly key: string;
  /** "article", "book" …, in small letters. */
  readonly type: string;
  readonly fields: Readonly<Record<string, string>>;
}

/** Why BibTeX cannot be read, and where in its text. */
export interface BibtexMisreading {
  readonly message: string;
  readonly at: number;
}

export type BibtexReading =
  | { readonly ok: true; readonly entries: readonly BibliographyEntry[] }
  | { readonly ok: false; readonly misreading: BibtexMisreading };

const months: Readonly<Record<string, string>> = Object.fromEntries(
  ['January', 'February', 'March', 'April', 'May', 'June', 'July', 'August', 'September', 'October']
    .concat(['November', 'December'])
    .map((name) => [name.slice(0, 3).toLowerCase(), name]),
);

class Misreading extends Error {
  readonly at: number;
  constructor(message: string, at: number) {
    super(message);
    this.at = at;
  }
}

/** Reads BibTeX from its beginning to its end; what stands between entries is a comment. */
class Reader {
  private at = 0;
  private readonly strings: Record<string, string> = { ...months };
  private readonly text: string;

  constructor(text: string) {
    this.text = text;
  }

  read(): BibliographyEntry[] {
    const entries: BibliographyEntry[] = [];
    for (let sign = this.text.indexOf('@'); sign >= 0; sign = this.text.indexOf('@', this.at)) {
      this.at = sign + 1;
      const type = this.word('the kind of an entry, such as article').toLowerCase();
      const close = this.open();
      if (type === 'comment' || type === 'preamble') this.skip(close);
      else if (type === 'string') Object.assign(this.strings, this.fields(close));
      else {
        const begins = this.at;
        const key = this.match(/\s*([^\s,{}()"=#%]+)\s*/uy)?.[1];
        if (key === undefined) throw new Misreading(`This ${type} has no key to be cited by.`, begins);
        if (entries.some((entry) => entry.key === key))
          throw new Misreading(`Two entries are called ${key}.`, begins);
        this.match(/\s*,/uy);
        entries.push({ key, type, fields: this.fields(close) });
      }
    }
    return entries;
  }

  private match(pattern: RegExp): RegExpExecArray | null {
    pattern.lastIndex = this.at;
    const found = pattern.exec(this.text);
    if (found !== null) this.at = pattern.lastIndex;
    return found;
  }

  private word(expected: string): string {
    const found = this.match(/\s*([^\s,{}()"=#%@]+)/uy)?.[1];
    if (found === undefined) throw new Misreading(`Here ${expected} is missing.`, this.at);
    return found;
  }

  private open(): string {
    const sign = this.match(/\s*([{(])/uy)?.[1];
    if (sign === undefined) throw new Misreading('An entry begins with { after its kind.', this.at);
    return sign === '{' ? '}' : ')';
  }

  private skip(close: string): void {
    const end = this.text.indexOf(close, this.at);
    this.at = end < 0 ? this.text.length : end + 1;
  }

  private fields(close: string): Record<string, string> {
    const fields: Record<string, string> = {};
    for (;;) {
      this.match(/[\s,]*/uy);
      if (this.text[this.at] === close) {
        this.at += 1;
        return fields;
      }
      if (this.at >= this.text.length) throw new Misreading(`An entry is not closed by ${close}.`, this.at);
      const name = this.word('the name of a field').toLowerCase();
      if (this.match(/\s*=\s*/uy) === null) throw new Misreading(`${name} is given no value by =.`, this.at);
      fields[name] = this.value();
    }
  }

  /** Parts in braces or quotes, numbers and names of strings, joined by #. */
  private value(): string {
    const parts: string[] = [];
    do parts.push(this.part());
    while (this.match(/\s*#\s*/uy) !== null);
    return plainOfTex(parts.join(''));
  }

  private part(): string {
    const sign = this.text[this.at];
    if (sign === '{') return this.enclosed('}');
    if (sign === '"') return this.enclosed('"');
    const begins = this.at;
    const word = this.word('a value');
    if (/^\d+$/u.test(word)) return word;
    const known = this.strings[word.toLowerCase()];
    if (known === undefined)
      throw new Misreading(`${word} stands without braces or quotes, and no string is called that.`, begins);
    return known;
  }

  /** What stands up to the closing sign; braces within it are in pairs. */
  private enclosed(close: string): string {
    const begins = this.at;
    let depth = 0;
    for (this.at += 1; this.at < this.text.length; this.at += 1) {
      const sign = this.text[this.at];
      if (sign === '\\') this.at += 1;
      else if (sign === close && depth === 0) {
        this.at += 1;
        return this.text.slice(begins + 1, this.at - 1);
      } else if (sign === '{') depth += 1;
      else if (sign === '}') depth -= 1;
    }
    throw new Misreading(`A value that begins here is not closed by ${close}.`, begins);
  }
}

/** Reads BibTeX: entries in order, strings put in, TeX accents as letters. The first thing that cannot be read ends it. */
export function readBibtex(text: string): BibtexReading {
  try {
    return { ok: true, entries: new Reader(text).read() };
  } catch (error) {
    if (!(error instanceof Misreading)) throw error;
    return { ok: false, misreading: { message: error.message, at: error.at } };
  }
}
