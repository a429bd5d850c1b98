import { Failure, makeIt } from '../notation/failure.ts';
import { nearest } from '../notation/nearest.ts';
import type { Scanner } from '../notation/tokens.ts';
import { isFunctionName, isKeyword, reservedReason } from '../notation/words.ts';
import { commonSymbols, findSymbol } from '../units/table.ts';
import { FACTOR_LIMIT, POWER_LIMIT, readUnit } from '../units/parse.ts';
import { functionNames } from './expression.ts';
import type { BinaryOperator, Comparison, FunctionName } from './expression.ts';
import type { ExpressionSyntax, NameSyntax, RangeSyntax } from './syntax.ts';

/** Brackets, signs and powers may nest this deep, and the tree may be this high: whoever walks it recurses. */
const DEPTH_LIMIT = 100;
const HEIGHT_LIMIT = 1000;
/** No decimal that a person writes is longer; an exact value of it would only cost time. */
const NUMBER_LENGTH_LIMIT = 400;

const Level = { or: 1, and: 2, not: 3, compare: 4, sum: 5, product: 6, sign: 7 } as const;

const binaryLevels: Readonly<Record<string, number>> = {
  '+': Level.sum,
  '-': Level.sum,
  '*': Level.product,
  '/': Level.product,
  '%': Level.product,
};
const comparisons = new Set(['==', '!=', '<', '<=', '>', '>=']);

/** How many values each function takes; those not named take one. */
const argumentCounts: Partial<Record<FunctionName, readonly [number, number]>> = {
  min: [1, Infinity],
  max: [1, Infinity],
  if: [3, 3],
  hill: [3, 3],
};

export interface ExpressionOptions {
  /** Whether numbers and brackets may be followed by a unit. */
  readonly units: boolean;
}

/**
 * Reads an expression from the scanner (mode "expression") and leaves it on the first word that does not belong to it.
 * Throws Failure at the word that cannot go on.
 *
 * A unit stands after a number or a closing bracket. One that begins with `/` (`2 /s`, `(2*a) /s`) is a unit only where the
 * quantity is all there is in its place; within a longer expression `/` divides.
 */
export function parseExpression(
  scanner: Scanner,
  options: ExpressionOptions = { units: true },
): ExpressionSyntax {
  return new ExpressionParser(scanner, options.units).whole();
}

/** `i = first..last`. */
export function parseRange(scanner: Scanner): RangeSyntax {
  const from = scanner.from;
  if (scanner.kind !== 'name') throw unexpected(scanner, 'an index such as i = 1..10');
  const name = scanner.word;
  const reason = reservedReason(name);
  if (reason !== null) throw new Failure(from, scanner.to, `${reason} and cannot be an index.`);
  scanner.advance();
  if (!scanner.take('=')) throw unexpected(scanner, `= after the index ${name}`);
  const first = parseExpression(scanner, { units: false });
  if (!scanner.take('..')) throw unexpected(scanner, `.. and the last value of ${name}`);
  const last = parseExpression(scanner, { units: false });
  return { name, first, last, from, to: scanner.previousEnd };
}

/** `[a, b]` after a name, or null where no bracket follows. */
export function parseIndices(scanner: Scanner): readonly ExpressionSyntax[] | null {
  if (!scanner.take('[')) return null;
  const indices: ExpressionSyntax[] = [];
  do indices.push(parseExpression(scanner, { units: false }));
  while (scanner.take(','));
  if (!scanner.is(']')) throw unexpected(scanner, '] or another index');
  return indices;
}

/** The failure of finding something else than what was expected at the current word. */
export function unexpected(scanner: Scanner, expected: string): Failure {
  return new Failure(scanner.from, scanner.to, `Expected ${expected}, found ${describeWord(scanner)}.`);
}

function describeWord(scanner: Scanner): string {
  if (scanner.kind === 'end') return 'nothing more';
  const code = scanner.word.codePointAt(0) ?? 0;
  const printable = scanner.kind !== 'unknown' || (code > 32 && (code < 0xd800 || code > 0xdfff));
  return printable ? scanner.word : `the character U+${code.toString(16).toUpperCase().padStart(4, '0')}`;
}

class ExpressionParser {
  /** Height of the tree read last. */
  private height = 0;
  private readonly scanner: Scanner;
  private readonly units: boolean;

  constructor(scanner: Scanner, units: boolean) {
    this.scanner = scanner;
    this.units = units;
  }

  whole(): ExpressionSyntax {
    this.enter();
    const value = this.binary(0, true);
    const { scanner } = this;
    if (this.units && scanner.kind === 'name' && !isKeyword(scanner.word)) throw this.notAUnit(value);
    this.leave();
    return value;
  }

  private enter(): void {
    const { scanner } = this;
    scanner.depth += 1;
    if (scanner.depth > DEPTH_LIMIT) {
      throw new Failure(scanner.from, scanner.to, `This is nested more than ${DEPTH_LIMIT} deep.`, {
        hint: 'Give a part of it a name with let.',
      });
    }
  }

  private leave(): void {
    this.scanner.depth -= 1;
    this.height += 1;
  }

  private nested(read: () => ExpressionSyntax): ExpressionSyntax {
    this.enter();
    const result = read();
    this.leave();
    return result;
  }

  /** Operators of at least this level. `first`: nothing of the expression stands before. */
  private binary(level: number, first: boolean): ExpressionSyntax {
    let left = this.prefix(level, first);
    for (;;) {
      const height = this.height;
      const next = this.operator(left, level);
      if (!next) return left;
      this.height = Math.max(this.height, height) + 1;
      if (this.height > HEIGHT_LIMIT) {
        throw new Failure(
          left.from,
          left.to,
          `More than ${HEIGHT_LIMIT} operations build on each other here.`,
          {
            hint: 'Give a part of it a name with let, or write sum(i = 1..L, …).',
          },
        );
      }
      left = next;
    }
  }

  /** Goes on from `left` with the operator at the scanner, or null where its level is below `level`. */
  private operator(left: ExpressionSyntax, level: number): ExpressionSyntax | null {
    const { scanner } = this;
    const { word } = scanner;
    if (scanner.kind === 'name' && (word === 'and' || word === 'or')) {
      if (Level[word] < level) return null;
      scanner.advance();
      const right = this.binary(Level[word] + 1, false);
      return { kind: 'logic', operator: word, left, right, from: left.from, to: right.to };
    }
    if (scanner.kind !== 'symbol') return null;
    if (comparisons.has(word))
      return level <= Level.compare ? this.comparison(left, word as Comparison) : null;
    const own = binaryLevels[word];
    if (own === undefined || own < level) return null;
    scanner.advance();
    const right = this.binary(own + 1, false);
    return { kind: 'binary', operator: word as BinaryOperator, left, right, from: left.from, to: right.to };
  }

  private comparison(left: ExpressionSyntax, operator: Comparison): ExpressionSyntax {
    const { scanner } = this;
    scanner.advance();
    const right = this.binary(Level.compare + 1, false);
    if (scanner.kind === 'symbol' && comparisons.has(scanner.word)) {
      throw new Failure(scanner.from, scanner.to, 'Comparisons cannot be chained.', {
        hint: 'Write a < b and b < c.',
      });
    }
    return { kind: 'compare', operator, left, right, from: left.from, to: right.to };
  }

  private prefix(level: number, first: boolean): ExpressionSyntax {
    const { scanner } = this;
    const from = scanner.from;
    if (scanner.isName('not')) {
      if (level > Level.not) throw new Failure(from, scanner.to, 'not must stand in brackets here: (not …).');
      scanner.advance();
      const of = this.nested(() => this.binary(Level.not, false));
      return { kind: 'not', of, from, to: of.to };
    }
    if (scanner.take('-')) {
      const of = this.nested(() => this.prefix(Level.sign, false));
      return { kind: 'negate', of, from, to: of.to };
    }
    if (scanner.take('+')) return this.nested(() => this.prefix(Level.sign, false));
    return this.power(first);
  }

  private power(first: boolean): ExpressionSyntax {
    const base = this.primary(first);
    if (!this.scanner.take('^')) return base;
    const exponent = this.nested(() => this.prefix(Level.sign, false));
    return { kind: 'binary', operator: '^', left: base, right: exponent, from: base.from, to: exponent.to };
  }

  private primary(first: boolean): ExpressionSyntax {
    const { scanner } = this;
    const from = scanner.from;
    this.height = 1;
    if (scanner.kind === 'number') {
      const { to, word: text } = scanner;
      if (text.length > NUMBER_LENGTH_LIMIT) {
        throw new Failure(from, to, `This number has more than ${NUMBER_LENGTH_LIMIT} characters.`);
      }
      scanner.advance();
      return this.withUnit({ kind: 'number', text, from, to }, first);
    }
    if (scanner.take('(')) {
      const inner = this.whole();
      if (!scanner.is(')')) throw this.closingExpected();
      scanner.advance();
      return this.withUnit(inner, first);
    }
    if (scanner.kind === 'name') return this.named();
    throw unexpected(scanner, 'a number, a name or (');
  }

  private withUnit(of: ExpressionSyntax, first: boolean): ExpressionSyntax {
    const { scanner } = this;
    if (!this.units) return of;
    const start = scanner.mark();
    const before = scanner.previousEnd;
    const leadsWithSlash = scanner.is('/');
    if (leadsWithSlash && !first) return of;
    const unit = readUnit(scanner);
    if (unit.length === 0) return of;
    if (leadsWithSlash && !this.atEndOfValue()) {
      scanner.reset(start, before);
      return of;
    }
    const to = scanner.previousEnd;
    return { kind: 'measured', of, unit, unitSpan: { from: start, to }, from: of.from, to };
  }

  private atEndOfValue(): boolean {
    const { scanner } = this;
    if (scanner.kind === 'end' || scanner.is(')') || scanner.is(',') || scanner.is(':')) return true;
    return scanner.isName('for') || scanner.isName('in') || scanner.isName('where');
  }

  private named(): ExpressionSyntax {
    const { scanner } = this;
    const { from, to, word: name } = scanner;
    if (name === 'sum') return this.sum();
    if (isKeyword(name)) throw unexpected(scanner, 'a number, a name or (');
    scanner.advance();
    if (scanner.is('(')) {
      if (!isFunctionName(name)) throw this.notAFunction(name, from, to);
      return this.call(name, from);
    }
    if (isFunctionName(name)) throw new Failure(from, to, `${name} is a function: write ${name}(…).`);
    const indices = parseIndices(scanner);
    if (indices) scanner.advance();
    const result: NameSyntax = { kind: 'name', name, indices, from, to: indices ? scanner.previousEnd : to };
    return result;
  }

  private call(name: FunctionName, from: number): ExpressionSyntax {
    const { scanner } = this;
    scanner.advance();
    const values: ExpressionSyntax[] = [];
    let height = 0;
    if (!scanner.is(')')) {
      do {
        values.push(this.whole());
        height = Math.max(height, this.height);
      } while (scanner.take(','));
    }
    this.height = height;
    if (!scanner.is(')')) throw this.closingExpected();
    scanner.advance();
    const [least, most] = argumentCounts[name] ?? [1, 1];
    if (values.length < least || values.length > most) {
      const wanted = least === most ? String(least) : `at least ${least}`;
      throw new Failure(from, scanner.previousEnd, `${name} takes ${wanted}, not ${values.length}.`);
    }
    return { kind: 'call', name, arguments: values, from, to: scanner.previousEnd };
  }

  private sum(): ExpressionSyntax {
    const { scanner } = this;
    const from = scanner.from;
    scanner.advance();
    if (!scanner.take('(')) throw unexpected(scanner, '( after sum');
    const ranges = [parseRange(scanner)];
    while (scanner.take(',')) {
      if (!this.atRange()) {
        const of = this.whole();
        if (!scanner.is(')')) throw this.closingExpected();
        scanner.advance();
        return { kind: 'sum', ranges, of, from, to: scanner.previousEnd };
      }
      ranges.push(parseRange(scanner));
    }
    throw unexpected(scanner, 'a comma and what is summed');
  }

  private atRange(): boolean {
    const { scanner } = this;
    if (scanner.kind !== 'name') return false;
    const start = scanner.mark();
    const before = scanner.previousEnd;
    scanner.advance();
    const range = scanner.is('=');
    scanner.reset(start, before);
    return range;
  }

  private closingExpected(): Failure {
    const { scanner } = this;
    if (!scanner.is('=')) return unexpected(scanner, ')');
    return singleEquals(scanner);
  }

  private notAFunction(name: string, from: number, to: number): Failure {
    const meant = nearest(name, functionNames);
    return new Failure(from, to, `${name} is not a function.`, {
      hint: `Functions are ${functionNames.join(', ')} and sum; a product is written with *.`,
      repairs: meant ? [makeIt(meant, from, to)] : [],
    });
  }

  private notAUnit(value: ExpressionSyntax): Failure {
    const { from, to, word } = this.scanner;
    const afterNumber = value.kind === 'number' || value.kind === 'measured';
    if (!afterNumber) return unexpected(this.scanner, 'an operator or the end');
    if (findSymbol(word)) {
      return new Failure(
        from,
        to,
        `A unit has at most ${FACTOR_LIMIT} factors with whole powers up to ${POWER_LIMIT}.`,
        {
          hint: 'Put the value in brackets to raise it to another power.',
        },
      );
    }
    const meant = nearest(word, commonSymbols);
    return new Failure(from, to, `${word} is not a unit.`, {
      hint: 'Units are products of s, min, h, d, mol, M, L, m, g, individuals, molecules and cells; a product with a name needs *.',
      repairs: meant ? [makeIt(meant, from, to)] : [],
    });
  }
}

/** The failure of a single = where a comparison belongs. */
export function singleEquals(scanner: Scanner): Failure {
  return new Failure(scanner.from, scanner.to, 'A comparison is written with ==.', {
    repairs: [makeIt('==', scanner.from, scanner.to)],
  });
}
