import { rational } from '../../network/index.ts';
import type { Rational } from '../../network/network.ts';
import type { Expression } from '../../expression/expression.ts';
import type { ExpressionSyntax, MeasuredSyntax, NameSyntax } from '../../expression/syntax.ts';
import { findSymbol } from '../../units/table.ts';
import { Failure, makeIt } from '../failure.ts';
import { nearest } from '../nearest.ts';
import type { Declarations, NameKind } from './declarations.ts';
import { compileRanges, forEachCombination } from './families.ts';
import { compileInteger } from './integers.ts';
import type { IntegerFunction, IntegerNames } from './integers.ts';
import type { NameTable } from './name-table.ts';
import type { ResultUnits } from './result-units.ts';
import type { Scope } from './scope.ts';
import type { SplitUnit } from './unit-names.ts';

/** All sums of a text write out at most this many terms. */
const TERM_LIMIT = 1_000_000;

export type NameTables = Readonly<Record<NameKind, NameTable>>;

/** Turns written expressions into expressions over resolved names and numbers in the units of the results. */
export class Resolver {
  private readonly compiled = new WeakMap<ExpressionSyntax, IntegerFunction>();
  /** Terms that sums have written out. */
  private terms = 0;
  private readonly declarations: Declarations;
  private readonly tables: NameTables;
  private readonly integers: IntegerNames;
  readonly units: ResultUnits;

  constructor(declarations: Declarations, tables: NameTables, units: ResultUnits, integers: IntegerNames) {
    this.declarations = declarations;
    this.tables = tables;
    this.units = units;
    this.integers = integers;
  }

  /** The expression in a scope. Throws Failure at an unknown name, an index that is no integer, a number out of range. */
  resolve(syntax: ExpressionSyntax, scope: Scope): Expression {
    switch (syntax.kind) {
      case 'number':
        return { kind: 'number', value: finiteNumber(syntax.text, syntax), text: syntax.text };
      case 'name':
        return this.resolveName(syntax, scope);
      case 'measured':
        return this.resolveMeasured(syntax, scope);
      case 'sum':
        return this.resolveSum(syntax, scope);
      case 'negate':
      case 'not':
        return { kind: syntax.kind, of: this.resolve(syntax.of, scope) };
      case 'call':
        return {
          kind: 'call',
          name: syntax.name,
          arguments: syntax.arguments.map((argument) => this.resolve(argument, scope)),
        };
      case 'binary': {
        const { kind, operator } = syntax;
        return {
          kind,
          operator,
          left: this.resolve(syntax.left, scope),
          right: this.resolve(syntax.right, scope),
        };
      }
      case 'compare': {
        const { kind, operator } = syntax;
        return {
          kind,
          operator,
          left: this.resolve(syntax.left, scope),
          right: this.resolve(syntax.right, scope),
        };
      }
      case 'logic': {
        const { kind, operator } = syntax;
        return {
          kind,
          operator,
          left: this.resolve(syntax.left, scope),
          right: this.resolve(syntax.right, scope),
        };
      }
    }
  }

  /** The values of the indices of a name in a scope; each a 32-bit integer. */
  indicesOf(indices: readonly ExpressionSyntax[] | null, scope: Scope): number[] {
    return (indices ?? []).map((index) => checkedIndex(this.integer(index, scope), index));
  }

  /** A unit without the names among its words. */
  splitUnit(syntax: MeasuredSyntax, scope: Scope): SplitUnit {
    return this.declarations.unitNames.split(syntax, scope.slots, scope.unitsFirst);
  }

  private unknownName({ name, from, to }: NameSyntax): Failure {
    const meant = nearest(name, this.declarations.all());
    const hint = findSymbol(name)
      ? `If ${name} is a unit: it stands after a number or a closing bracket, as in (1/2) /${name}.`
      : `Give it a value: let ${name} = 1.`;
    const repairs = meant ? [makeIt(meant, from, from + name.length)] : [];
    const silent = this.declarations.inBrokenLines.has(name);
    return new Failure(from, to, `${name} is not known.`, { hint, repairs, silent });
  }

  private integer(syntax: ExpressionSyntax, scope: Scope): number {
    let compiled = this.compiled.get(syntax);
    if (!compiled) {
      compiled = compileInteger(syntax, scope.slots, this.integers);
      this.compiled.set(syntax, compiled);
    }
    return compiled(scope.values);
  }

  private resolveName(syntax: NameSyntax, scope: Scope): Expression {
    const { name, indices } = syntax;
    const slot = indices ? undefined : scope.slots.get(name);
    if (slot !== undefined) {
      const value = scope.values[slot] ?? NaN;
      return { kind: 'number', value, text: String(value) };
    }
    if (name === 't' || (name === 'n' && scope.count)) return { kind: 'name', name };
    const kind = this.declarations.kindOf(name);
    if (kind === null) throw this.unknownName(syntax);
    const table = this.tables[kind];
    const number = table.find(name, this.indicesOf(indices, scope));
    if (number >= 0) return { kind: 'name', name: table.nameOf(number) };
    throw this.unknownMember(syntax, kind, scope);
  }

  private unknownMember(syntax: NameSyntax, kind: NameKind, scope: Scope): Failure {
    const indices = this.indicesOf(syntax.indices, scope);
    const shown = indices.length > 0 ? `${syntax.name}[${indices.join(',')}]` : syntax.name;
    const hint =
      indices.length > 0
        ? 'The index may be out of range.'
        : `Elsewhere ${syntax.name} is written with an index.`;
    return new Failure(
      syntax.from,
      syntax.to,
      `${shown} ${kind === 'species' ? 'occurs in no row' : 'has no value'}.`,
      { hint },
    );
  }

  private resolveMeasured(syntax: MeasuredSyntax, scope: Scope): Expression {
    const { unit, divisors } = this.splitUnit(syntax, scope);
    let value = this.resolve(syntax.of, scope);
    if (unit.length > 0) value = scaled(value, this.units.convert(unit).factor, syntax);
    for (const { symbol, power } of divisors) {
      const name = this.resolveName({ kind: 'name', name: symbol, indices: null, ...syntax.unitSpan }, scope);
      const size = -power;
      const right: Expression =
        size === 1
          ? name
          : {
              kind: 'binary',
              operator: '^',
              left: name,
              right: { kind: 'number', value: size, text: String(size) },
            };
      value = { kind: 'binary', operator: '/', left: value, right };
    }
    return value;
  }

  private resolveSum(syntax: ExpressionSyntax & { kind: 'sum' }, scope: Scope): Expression {
    const { slots, ranges } = compileRanges(syntax.ranges, this.integers, scope.slots);
    const terms: Expression[] = [];
    forEachCombination(
      ranges,
      (values) => {
        this.terms += 1;
        if (this.terms > TERM_LIMIT) {
          throw new Failure(
            syntax.from,
            syntax.to,
            `The sums of this text have more than ${TERM_LIMIT} terms.`,
          );
        }
        terms.push(this.resolve(syntax.of, { ...scope, slots, values: [...values] }));
      },
      scope.values,
    );
    return balancedSum(terms, 0, terms.length);
  }
}

/** Throws Failure where an index is no 32-bit integer. */
export function checkedIndex(value: number, at: ExpressionSyntax): number {
  if ((value | 0) === value) return value;
  throw new Failure(at.from, at.to, `An index must be a whole number below 2^31; this is ${value}.`);
}

/** The double of a decimal. Throws Failure where it is beyond the doubles or would become 0. */
export function finiteNumber(text: string, at: { from: number; to: number }): number {
  const value = Number(text);
  if (!Number.isFinite(value)) throw new Failure(at.from, at.to, `${text} is too large a number.`);
  if (value === 0 && /[1-9]/.test(text.replace(/e.*$/i, ''))) {
    throw new Failure(at.from, at.to, `${text} is too small a number: it would become 0.`);
  }
  return value;
}

/** A sum as a tree of least height, so that a long one can be walked. */
function balancedSum(terms: readonly Expression[], from: number, to: number): Expression {
  const [only] = terms.slice(from, from + 1);
  if (to - from <= 1) return only && to > from ? only : { kind: 'number', value: 0, text: '0' };
  const middle = (from + to + 1) >> 1;
  const left = balancedSum(terms, from, middle);
  return { kind: 'binary', operator: '+', left, right: balancedSum(terms, middle, to) };
}

/** A value times the factor of its unit; a number is multiplied exactly and rounded once. */
function scaled(value: Expression, factor: Rational, at: { from: number; to: number }): Expression {
  if (rational.equal(factor, rational.one)) return value;
  if (value.kind === 'number') {
    const exact = rational.multiply(
      rational.ofDecimal(value.text ?? '') ?? rational.ofNumber(value.value),
      factor,
    );
    return exactNumber(exact, at);
  }
  return { kind: 'binary', operator: '*', left: value, right: exactNumber(factor, at) };
}

function exactNumber(exact: Rational, at: { from: number; to: number }): Expression {
  const value = rational.toNumber(exact);
  if (!Number.isFinite(value))
    throw new Failure(at.from, at.to, 'In the units of the results this is too large a number.');
  return { kind: 'number', value, text: rational.print(exact) };
}
