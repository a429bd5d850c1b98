import { evaluate } from '../../expression/evaluate.ts';
import { exactValue } from '../../expression/exact.ts';
import type { Expression } from '../../expression/expression.ts';
import { freeNames } from '../../expression/names.ts';
import type { ExpressionSyntax, Span } from '../../expression/syntax.ts';
import type { Quantity, StartQuantity } from '../../network/network.ts';
import { rational } from '../../network/index.ts';
import type { Complaints } from '../complaints.ts';
import { Failure } from '../failure.ts';
import type { Resolver } from './resolver.ts';
import { finiteNumber } from './resolver.ts';
import type { Scope } from './scope.ts';

/** What a text says a constant is. */
export interface Definition {
  readonly value: ExpressionSyntax;
  readonly scope: Scope;
  /** The name it is given to. */
  readonly at: Span;
  readonly line: number;
}

/** The values of constants, each computed once after those it draws on. */
export class Values {
  private readonly definitions = new Map<string, Definition>();
  private readonly quantities = new Map<string, Quantity | null>();
  private readonly resolved = new Map<string, Expression | null>();
  private readonly resolver: Resolver;
  private readonly complaints: Complaints;

  constructor(resolver: Resolver, complaints: Complaints) {
    this.resolver = resolver;
    this.complaints = complaints;
  }

  definition(name: string): Definition | undefined {
    return this.definitions.get(name);
  }

  /** Takes down the value of a constant; a second one is an error. */
  define(name: string, definition: Definition): void {
    const known = this.definitions.get(name);
    if (!known) {
      this.definitions.set(name, definition);
      return;
    }
    this.complaints.error(
      definition.at,
      `${name} already has a value in line ${known.line}.`,
      'A name gets its value once.',
    );
  }

  /** The value of a constant, null where the text gives none or it failed. */
  of(name: string): Quantity | null {
    const known = this.quantities.get(name);
    if (known !== undefined) return known;
    this.settle(name);
    return this.quantities.get(name) ?? null;
  }

  /** The expression of a value that is derived from other constants; null for others. To be asked after `of`. */
  derivation(name: string): Expression | null {
    const expression = this.resolved.get(name) ?? null;
    return expression !== null && freeNames(expression).length > 0 ? expression : null;
  }

  /**
   * The value of an expression that stands where a number must: a start, a volume. Throws Failure where it cannot be
   * computed.
   */
  quantity(syntax: ExpressionSyntax, scope: Scope): Quantity {
    const plain = this.plainQuantity(syntax, scope);
    if (plain) return plain;
    const expression = this.resolver.resolve(syntax, scope);
    for (const name of freeNames(expression)) {
      if (!this.of(name))
        throw new Failure(syntax.from, syntax.to, `${name} has no value, which is needed here.`);
    }
    return this.compute(expression, syntax);
  }

  /** The same with how it is derived, where it is. Throws Failure where it cannot be computed. */
  derivedQuantity(syntax: ExpressionSyntax, scope: Scope): StartQuantity {
    const quantity = this.quantity(syntax, scope);
    if (syntax.kind === 'number') return quantity;
    const expression = this.resolver.resolve(syntax, scope);
    return freeNames(expression).length === 0 ? quantity : { ...quantity, expression };
  }

  /** Decimals with or without unit, by far the most values, without a tree. */
  private plainQuantity(syntax: ExpressionSyntax, scope: Scope): Quantity | null {
    if (syntax.kind === 'number') {
      return { value: finiteNumber(syntax.text, syntax), exact: rational.ofDecimal(syntax.text) };
    }
    if (syntax.kind !== 'measured' || syntax.of.kind !== 'number') return null;
    const { unit, divisors } = this.resolver.splitUnit(syntax, scope);
    if (divisors.length > 0) return null;
    const value = finiteNumber(syntax.of.text, syntax.of);
    const decimal = rational.ofDecimal(syntax.of.text);
    const { factor } = this.resolver.units.convert(unit);
    if (!decimal || rational.equal(factor, rational.one)) return { value, exact: decimal };
    const exact = rational.multiply(decimal, factor);
    return checkedQuantity({ value: rational.toNumber(exact), exact }, syntax);
  }

  /** Computes a constant after all it draws on, by a stack of our own: chains of lets may be long. */
  private settle(name: string): void {
    if (this.isSettled(name)) return;
    const open = new Set<string>();
    const stack = [name];
    for (let top = stack.at(-1); top !== undefined; top = stack.at(-1)) {
      const missing = this.namesIn(top).filter((used) => !this.isSettled(used));
      if (missing.length > 0 && !open.has(top) && !missing.some((used) => open.has(used))) {
        open.add(top);
        stack.push(...missing);
        continue;
      }
      if (missing.length > 0) this.circular(top);
      if (!this.quantities.has(top))
        this.quantities.set(top, missing.length > 0 ? null : this.evaluateConstant(top));
      stack.pop();
    }
  }

  /** Whether the value of a name is known, or can be read without any other. */
  private isSettled(name: string): boolean {
    if (this.quantities.has(name)) return true;
    const definition = this.definitions.get(name);
    let quantity: Quantity | null = null;
    try {
      quantity = definition ? this.plainQuantity(definition.value, definition.scope) : null;
      if (definition && !quantity) return false;
    } catch (thrown) {
      this.complaints.failure(thrown);
    }
    this.quantities.set(name, quantity);
    return true;
  }

  private circular(name: string): void {
    const definition = this.definitions.get(name);
    if (definition) this.complaints.error(definition.at, `${name} is defined through itself.`);
  }

  /** The names that the value of a constant uses. */
  private namesIn(name: string): readonly string[] {
    const expression = this.expressionOf(name);
    return expression ? freeNames(expression) : [];
  }

  private expressionOf(name: string): Expression | null {
    const known = this.resolved.get(name);
    if (known !== undefined) return known;
    const definition = this.definitions.get(name);
    let expression: Expression | null = null;
    try {
      if (definition) expression = this.resolver.resolve(definition.value, definition.scope);
    } catch (thrown) {
      this.complaints.failure(thrown);
    }
    this.resolved.set(name, expression);
    return expression;
  }

  private evaluateConstant(name: string): Quantity | null {
    const definition = this.definitions.get(name);
    const expression = this.expressionOf(name);
    // A value that draws on one that the text does not give is not given either.
    if (!definition || !expression || freeNames(expression).some((used) => !this.quantities.get(used)))
      return null;
    try {
      return this.compute(expression, definition.value);
    } catch (thrown) {
      this.complaints.failure(thrown);
      return null;
    }
  }

  private compute(expression: Expression, at: Span): Quantity {
    const exact = exactValue(expression, (name) => this.quantities.get(name)?.exact ?? null);
    const value = exact
      ? rational.toNumber(exact)
      : evaluate(expression, (name) => this.quantities.get(name)?.value ?? NaN);
    return checkedQuantity({ value, exact }, at);
  }
}

function checkedQuantity(quantity: Quantity, at: Span): Quantity {
  if (Number.isFinite(quantity.value)) return quantity;
  throw new Failure(at.from, at.to, 'This value is not a finite number.');
}
