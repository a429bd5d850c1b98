/** Functions that laws, lets and weights may call. `hill(x, K, n)` = x^n / (K^n + x^n). */
export const functionNames = [
  'exp',
  'ln',
  'log10',
  'sqrt',
  'abs',
  'sin',
  'cos',
  'tan',
  'sinh',
  'cosh',
  'tanh',
  'asin',
  'acos',
  'atan',
  'floor',
  'ceil',
  'round',
  'min',
  'max',
  'if',
  'hill',
] as const;
export type FunctionName = (typeof functionNames)[number];

export type BinaryOperator = '+' | '-' | '*' | '/' | '%' | '^';
export type Comparison = '==' | '!=' | '<' | '<=' | '>' | '>=';

/**
 * An expression after elaboration: family indices and `sum` are expanded, every name is the resolved name of a
 * species, constant, output, `t` or (in weights) `n`. Numbers are in the units of the text. Comparisons and the
 * logical operators give 1 or 0 and stand in conditions.
 */
export type Expression =
  | { readonly kind: 'number'; readonly value: number; readonly text?: string }
  | { readonly kind: 'name'; readonly name: string }
  | { readonly kind: 'negate'; readonly of: Expression }
  | { readonly kind: 'not'; readonly of: Expression }
  | {
      readonly kind: 'binary';
      readonly operator: BinaryOperator;
      readonly left: Expression;
      readonly right: Expression;
    }
  | {
      readonly kind: 'compare';
      readonly operator: Comparison;
      readonly left: Expression;
      readonly right: Expression;
    }
  | {
      readonly kind: 'logic';
      readonly operator: 'and' | 'or';
      readonly left: Expression;
      readonly right: Expression;
    }
  | { readonly kind: 'call'; readonly name: FunctionName; readonly arguments: readonly Expression[] };
