import type { ExpressionSyntax } from '../../expression/syntax.ts';
import { dimensionNames } from '../../units/table.ts';
import type { Dimension } from '../../units/table.ts';
import { sameDimension } from '../../units/unit.ts';
import { Failure } from '../failure.ts';
import type { Elaboration } from './stage.ts';
import type { Scope } from './scope.ts';

/** The dimension of a value; "pure" for a number without unit; null where it is not followed. */
export type ValueDimension = Dimension | 'pure' | null;

/** Lets that draw on each other more deeply than this are not followed. */
const DEPTH_LIMIT = 100;

/** Which unit a value is in, followed through products, powers and names. */
export class Dimensions {
  private readonly known = new Map<string, ValueDimension>();
  private depth = 0;
  private readonly stage: Elaboration;

  constructor(stage: Elaboration) {
    this.stage = stage;
  }

  ofConstant(name: string): ValueDimension {
    const known = this.known.get(name);
    if (known !== undefined) return known;
    const definition = this.stage.values.definition(name);
    if (!definition || this.depth > DEPTH_LIMIT) return null;
    if (definition.value.kind === 'number') {
      this.known.set(name, 'pure');
      return 'pure';
    }
    // What is defined through itself has none.
    this.known.set(name, null);
    this.depth += 1;
    const dimension = this.of(definition.value, definition.scope);
    this.depth -= 1;
    this.known.set(name, dimension);
    return dimension;
  }

  /** The unit of a constant in results, as printed; null for a pure number. */
  printedUnit(name: string): string | null {
    const dimension = this.ofConstant(name);
    if (dimension === null || dimension === 'pure') return null;
    return this.stage.units.unitFor(dimension).printed || null;
  }

  of(syntax: ExpressionSyntax, scope: Scope): ValueDimension {
    switch (syntax.kind) {
      case 'measured': {
        const { unit, divisors } = this.stage.resolver.splitUnit(syntax, scope);
        const own = unit.length > 0 ? this.stage.units.convert(unit).to.dimension : 'pure';
        return divisors.length > 0 ? null : product(this.of(syntax.of, scope), own, 1);
      }
      case 'name':
        return this.ofName(syntax.name, syntax.indices, scope);
      case 'negate':
        return this.of(syntax.of, scope);
      case 'binary':
        return this.ofOperation(syntax, scope);
      case 'call':
        if (syntax.name === 'if') return syntax.arguments[1] ? this.of(syntax.arguments[1], scope) : null;
        if (syntax.name !== 'min' && syntax.name !== 'max' && syntax.name !== 'abs') return 'pure';
        return syntax.arguments[0] ? this.of(syntax.arguments[0], scope) : null;
      case 'sum':
        return null;
      default:
        return 'pure';
    }
  }

  private ofName(name: string, indices: readonly ExpressionSyntax[] | null, scope: Scope): ValueDimension {
    if (!indices && scope.slots.has(name)) return 'pure';
    const { declarations, constants, resolver } = this.stage;
    if (declarations.kindOf(name) !== 'constant') return null;
    try {
      const number = constants.find(name, resolver.indicesOf(indices, scope));
      return number < 0 ? null : this.ofConstant(constants.nameOf(number));
    } catch (thrown) {
      // An index that cannot be had was told when the value was computed.
      if (thrown instanceof Failure) return null;
      throw thrown;
    }
  }

  private ofOperation(syntax: ExpressionSyntax & { kind: 'binary' }, scope: Scope): ValueDimension {
    const left = this.of(syntax.left, scope);
    if (syntax.operator === '^') {
      if (left === 'pure' || left === null) return left;
      const exponent = syntax.right.kind === 'number' ? Number(syntax.right.text) : NaN;
      return Number.isInteger(exponent) ? left.map((power) => power * exponent) : null;
    }
    const right = this.of(syntax.right, scope);
    if (syntax.operator === '*') return product(left, right, 1);
    if (syntax.operator === '/') return product(left, right, -1);
    if (left === 'pure') return right;
    return right === null || right === 'pure' || left === null || sameDimension(left, right) ? left : null;
  }
}

function product(left: ValueDimension, right: ValueDimension, sign: number): ValueDimension {
  if (left === null || right === null) return null;
  if (right === 'pure') return left;
  if (left === 'pure' && sign === 1) return right;
  const own = left === 'pure' ? dimensionNames.map(() => 0) : left;
  return own.map((power, i) => power + sign * (right[i] ?? 0));
}
