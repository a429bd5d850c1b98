import type { Unit } from '../units/unit.ts';
import type { BinaryOperator, Comparison, FunctionName } from './expression.ts';

/** A stretch of the text: offsets in UTF-16 units, `to` exclusive. */
export interface Span {
  readonly from: number;
  readonly to: number;
}

/** `i = 1..L`: an index that runs over the integers from `first` to `last`. */
export interface RangeSyntax extends Span {
  readonly name: string;
  readonly first: ExpressionSyntax;
  readonly last: ExpressionSyntax;
}

export interface NameSyntax extends Span {
  readonly kind: 'name';
  readonly name: string;
  /** Null where no bracket follows the name. */
  readonly indices: readonly ExpressionSyntax[] | null;
}

export interface MeasuredSyntax extends Span {
  readonly kind: 'measured';
  readonly of: ExpressionSyntax;
  readonly unit: Unit;
  /** Where the unit stands. */
  readonly unitSpan: Span;
}

/**
 * An expression as it is written, before names are resolved: with units, indices and sums. Brackets are not kept; the
 * printer writes those that are needed.
 */
export type ExpressionSyntax =
  | NameSyntax
  | MeasuredSyntax
  | (Span & { readonly kind: 'number'; readonly text: string })
  | (Span & { readonly kind: 'negate' | 'not'; readonly of: ExpressionSyntax })
  | (Span & {
      readonly kind: 'binary';
      readonly operator: BinaryOperator;
      readonly left: ExpressionSyntax;
      readonly right: ExpressionSyntax;
    })
  | (Span & {
      readonly kind: 'compare';
      readonly operator: Comparison;
      readonly left: ExpressionSyntax;
      readonly right: ExpressionSyntax;
    })
  | (Span & {
      readonly kind: 'logic';
      readonly operator: 'and' | 'or';
      readonly left: ExpressionSyntax;
      readonly right: ExpressionSyntax;
    })
  | (Span & {
      readonly kind: 'call';
      readonly name: FunctionName;
      readonly arguments: readonly ExpressionSyntax[];
    })
  | (Span & { readonly kind: 'sum'; readonly ranges: readonly RangeSyntax[]; readonly of: ExpressionSyntax });
