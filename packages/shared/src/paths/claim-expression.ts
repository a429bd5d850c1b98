import { type Path, readPathAt } from './path.ts';
import { MisreadError, type Reading, reading } from './reading.ts';

export const claimFunctions = [
  'abs',
  'min',
  'max',
  'sum',
  'mean',
  'sd',
  'first',
  'last',
  'at',
  'count',
] as const;
export type ClaimFunction = (typeof claimFunctions)[number];
export type ClaimComparison = '==' | '!=' | '<' | '<=' | '>' | '>=';
export type ClaimOperator = '+' | '-' | '*' | '/' | '^';

/** One side of a claim. Numbers keep their decimal text, so that they stay exact. */
export type ClaimTerm =
  | { readonly kind: 'number'; readonly text: string }
  | { readonly kind: 'word'; readonly text: string }
  | { readonly kind: 'truth'; readonly value: boolean }
  | { readonly kind: 'path'; readonly path: Path }
  | { readonly kind: 'negate'; readonly of: ClaimTerm }
  | {
      readonly kind: 'binary';
      readonly operator: ClaimOperator;
      readonly left: ClaimTerm;
      readonly right: ClaimTerm;
    }
  | {
      readonly kind: 'call';
      readonly name: ClaimFunction;
      readonly arguments: readonly ClaimTerm[];
      /** Offsets in the text. */
      readonly from: number;
      readonly to: number;
    };

/** A claim: one comparison. */
export interface ClaimExpression {
  readonly comparison: ClaimComparison;
  readonly left: ClaimTerm;
  readonly right: ClaimTerm;
}

const deepest = 200;
const comparisons: readonly ClaimComparison[] = ['==', '!=', '<=', '>=', '<', '>'];
const number = /(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,4})?/uy;
const word = /"((?:[^"\\\n]|\\.)*)"/uy;
const call = /([\p{L}_][\p{L}\p{M}\p{N}_']*)\s*\(/uy;

/** Recursive descent over one claim. `^` binds tightest and to the right, then unary minus, `* /`, `+ -`. */
class ClaimReader {
  private at = 0;
  private depth = 0;
  private readonly text: string;

  constructor(text: string) {
    this.text = text;
  }

  read(): ClaimExpression {
    if (this.text.trim() === '') {
      throw new MisreadError(
        'This claim says nothing yet.',
        0,
        'A claim compares two things: structure1.counts.deficiency == 0',
      );
    }
    const left = this.sum();
    const comparison = this.comparison();
    if (comparison === null) {
      const found = this.rest();
      throw new MisreadError(
        found === '' ? 'A claim needs a comparison.' : `"${found}" is not expected here.`,
        this.at,
        `Compare two things with one of ${comparisons.join(' ')}.`,
      );
    }
    const right = this.sum();
    const another = this.at;
    if (this.comparison() !== null) {
      throw new MisreadError(
        'A claim is one comparison.',
        another,
        'Put the second one into a claim of its own.',
      );
    }
    const found = this.rest();
    if (found !== '') throw new MisreadError(`"${found}" is not expected here.`, this.at);
    return { comparison, left, right };
  }

  private blank(): void {
    while (/\s/u.test(this.text[this.at] ?? '')) this.at++;
  }

  private rest(): string {
    this.blank();
    return this.text.slice(this.at, this.at + 20).trim();
  }

  private take(sign: string): boolean {
    this.blank();
    if (!this.text.startsWith(sign, this.at)) return false;
    this.at += sign.length;
    return true;
  }

  private comparison(): ClaimComparison | null {
    const found = comparisons.find((sign) => this.take(sign)) ?? null;
    if (found === null && this.rest().startsWith('=')) {
      throw new MisreadError('A single = compares nothing.', this.at, 'Write == for "is equal to".');
    }
    return found;
  }

  private sum(): ClaimTerm {
    let left = this.product();
    for (;;) {
      const operator = this.take('+') ? '+' : this.take('-') ? '-' : null;
      if (operator === null) return left;
      left = { kind: 'binary', operator, left, right: this.product() };
    }
  }

  private product(): ClaimTerm {
    let left = this.signed();
    for (;;) {
      const operator = this.take('*') ? '*' : this.take('/') ? '/' : null;
      if (operator === null) return left;
      left = { kind: 'binary', operator, left, right: this.signed() };
    }
  }

  private signed(): ClaimTerm {
    if (++this.depth > deepest) throw new MisreadError('This claim is nested too deeply.', this.at);
    const term: ClaimTerm = this.take('-') ? { kind: 'negate', of: this.signed() } : this.power();
    this.depth--;
    return term;
  }

  private power(): ClaimTerm {
    const base = this.primary();
    return this.take('^') ? { kind: 'binary', operator: '^', left: base, right: this.signed() } : base;
  }

  private match(pattern: RegExp): RegExpExecArray | null {
    this.blank();
    pattern.lastIndex = this.at;
    const found = pattern.exec(this.text);
    if (found !== null) this.at += found[0].length;
    return found;
  }

  private primary(): ClaimTerm {
    if (this.take('(')) {
      const inner = this.sum();
      this.close();
      return inner;
    }
    const digits = this.match(number);
    if (digits !== null) return { kind: 'number', text: digits[0] };
    const quoted = this.match(word);
    if (quoted !== null) return { kind: 'word', text: (quoted[1] ?? '').replace(/\\(.)/gu, '$1') };
    this.blank();
    const begin = this.at;
    const called = this.match(call);
    if (called !== null) return this.call(called[1] ?? '', begin);
    if (!/[\p{L}_]/u.test(this.text[begin] ?? '')) {
      const found = this.rest();
      throw new MisreadError(
        found === '' ? 'A number or a path is missing here.' : `"${found}" is neither a number nor a path.`,
        begin,
        'A path looks like run1.species.P.',
      );
    }
    const path = readPathAt(this.text, begin);
    this.at = path.to;
    if (path.steps.length === 0 && (path.head === 'true' || path.head === 'false')) {
      return { kind: 'truth', value: path.head === 'true' };
    }
    return { kind: 'path', path };
  }

  private call(name: string, begin: number): ClaimTerm {
    const known = claimFunctions.find((one) => one === name);
    if (known === undefined) {
      throw new MisreadError(
        `There is no function ${name}.`,
        begin,
        `There are ${claimFunctions.join(', ')}.`,
      );
    }
    const given: ClaimTerm[] = [this.sum()];
    while (this.take(',')) given.push(this.sum());
    this.close();
    const wanted = known === 'at' ? 2 : known === 'min' || known === 'max' || known === 'sum' ? null : 1;
    if (wanted !== null && given.length !== wanted) {
      throw new MisreadError(
        `${known} takes ${wanted === 1 ? 'one argument' : 'a path and a time'}, not ${given.length}.`,
        begin,
        known === 'at' ? 'Write at(run1.species.P, 5).' : null,
      );
    }
    return { kind: 'call', name: known, arguments: given, from: begin, to: this.at };
  }

  private close(): void {
    if (!this.take(')')) throw new MisreadError('A closing bracket is missing here.', this.at);
  }
}

/** Reads the text of a claim cell. */
export function parseClaim(text: string): Reading<ClaimExpression> {
  return reading(() => new ClaimReader(text).read());
}

/** All paths of a claim, in order of writing. */
export function claimPaths(claim: ClaimExpression): Path[] {
  const found: Path[] = [];
  const walk = (term: ClaimTerm): void => {
    if (term.kind === 'path') found.push(term.path);
    else if (term.kind === 'negate') walk(term.of);
    else if (term.kind === 'binary') [term.left, term.right].forEach(walk);
    else if (term.kind === 'call') term.arguments.forEach(walk);
  };
  [claim.left, claim.right].forEach(walk);
  return found;
}
