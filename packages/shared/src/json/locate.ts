/** Where a text stops being JSON: offset, what stands there, what JSON has in that place. */
export interface JsonFault {
  readonly at: number;
  readonly found: string;
  readonly expected: string;
}

const literal = /true|false|null|-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/uy;
const string = /"(?:[ !#-[\]-\u{10FFFF}]|\\(?:["\\/bfnrt]|u[0-9a-fA-F]{4}))*"/uy;
const blank = /[ \t\n\r]*/uy;

/** What a quote that begins no proper string is called. */
const brokenText = 'A text with a line break, a wrong escape or no closing quote';

class Fault extends Error {
  readonly fault: JsonFault;
  constructor(fault: JsonFault) {
    super(fault.expected);
    this.fault = fault;
  }
}

/** Walks a JSON text (RFC 8259) without building anything, to say where it breaks. */
class Walk {
  private at = 0;
  private readonly text: string;

  constructor(text: string) {
    this.text = text;
  }

  document(): void {
    this.value();
    this.skip();
    if (this.at < this.text.length) this.fail('the end of the text');
  }

  private skip(): void {
    blank.lastIndex = this.at;
    blank.exec(this.text);
    this.at = blank.lastIndex;
  }

  private fail(expected: string): never {
    const found = /^[\p{L}\p{N}_.+-]{1,20}/u.exec(this.text.slice(this.at, this.at + 20))?.[0];
    const sign = String.fromCodePoint(this.text.codePointAt(this.at) ?? 0);
    throw new Fault({
      at: this.at,
      found:
        this.at >= this.text.length
          ? 'The end of the text'
          : sign === '"'
            ? brokenText
            : `"${found ?? sign}"`,
      expected,
    });
  }

  private match(pattern: RegExp): boolean {
    pattern.lastIndex = this.at;
    if (!pattern.test(this.text)) return false;
    this.at = pattern.lastIndex;
    return true;
  }

  private take(sign: string): boolean {
    this.skip();
    if (this.text[this.at] !== sign) return false;
    this.at++;
    return true;
  }

  private value(): void {
    this.skip();
    if (this.take('{')) this.members();
    else if (this.take('[')) this.entries();
    else if (!this.match(string) && !this.match(literal)) this.fail('a value');
  }

  private members(): void {
    if (this.take('}')) return;
    do {
      this.skip();
      if (!this.match(string)) this.fail('a key in double quotes');
      if (!this.take(':')) this.fail('a colon');
      this.value();
    } while (this.take(','));
    if (!this.take('}')) this.fail('a comma or }');
  }

  private entries(): void {
    if (this.take(']')) return;
    do this.value();
    while (this.take(','));
    if (!this.take(']')) this.fail('a comma or ]');
  }
}

/**
 * Where a text stops being JSON, independent of the machine that reads it; null where it is JSON, or nested so deeply
 * that no place can be named.
 */
export function locateJsonFault(text: string): JsonFault | null {
  try {
    new Walk(text).document();
    return null;
  } catch (error) {
    return error instanceof Fault ? error.fault : null;
  }
}
