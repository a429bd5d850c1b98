import type { ExpressionSyntax, NameSyntax, RangeSyntax, Span } from '../expression/syntax.ts';

/** A name with its indices, as the target of an assignment or a species of a side. */
export interface TargetSyntax extends Span {
  readonly name: string;
  readonly indices: readonly ExpressionSyntax[] | null;
}

/** `[i = 1..L where c]` before a row, or `for i = 1..L where c` after an assignment. */
export interface FamilySyntax extends Span {
  readonly ranges: readonly RangeSyntax[];
  readonly where: ExpressionSyntax | null;
}

export interface TermSyntax extends Span {
  /** Coefficient in lowest terms; both below 2^53 and positive. */
  readonly numerator: number;
  readonly denominator: number;
  readonly species: TargetSyntax;
}

/** One side of an arrow; no terms is the zero complex. */
export interface SideSyntax extends Span {
  readonly terms: readonly TermSyntax[];
}

export interface ArrowSyntax extends Span {
  readonly sign: '->' | '<-' | '<=>';
}

export type ItemSyntax =
  | (Span & { readonly kind: 'law'; readonly value: ExpressionSyntax })
  | (Span & { readonly kind: 'net'; readonly value: ExpressionSyntax })
  | (Span & { readonly kind: 'constant'; readonly name: NameSyntax; readonly value: ExpressionSyntax | null })
  | (Span & { readonly kind: 'value'; readonly value: ExpressionSyntax });

/** `X[i] = value for i = 1..L`. */
export interface AssignmentSyntax extends Span {
  readonly target: TargetSyntax;
  readonly value: ExpressionSyntax;
  readonly family: FamilySyntax | null;
}

/** `X[i] for i = 1..L` in the list of an `in` statement. */
export interface PlacedSyntax extends Span {
  readonly target: TargetSyntax;
  readonly family: FamilySyntax | null;
}

interface LineBase extends Span {
  /** 1-based. */
  readonly line: number;
  /** What follows `#`, as written; null where there is none. */
  readonly comment: string | null;
}

export interface RowSyntax extends LineBase {
  readonly kind: 'row';
  readonly family: FamilySyntax | null;
  readonly sides: readonly SideSyntax[];
  /** One fewer than sides. */
  readonly arrows: readonly ArrowSyntax[];
  readonly items: readonly ItemSyntax[];
  /** Where the constants stand, or would stand. */
  readonly itemsSpan: Span;
  readonly note: string;
}

export type AssignmentWord = 'start' | 'let' | 'fix' | 'volume' | 'weight' | 'rate';

export interface AssignmentsSyntax extends LineBase {
  readonly kind: AssignmentWord;
  readonly items: readonly AssignmentSyntax[];
}

export interface PlaceSyntax extends LineBase {
  readonly kind: 'in';
  readonly compartment: TargetSyntax;
  readonly species: readonly PlacedSyntax[];
}

export interface EventSyntax extends LineBase {
  readonly kind: 'event';
  readonly when: ExpressionSyntax;
  readonly set: readonly AssignmentSyntax[];
}

export interface BlankSyntax extends LineBase {
  readonly kind: 'blank';
}

/** A line that holds an error; `source` is what stands there, without the comment. */
export interface BrokenSyntax extends LineBase {
  readonly kind: 'broken';
  readonly source: string;
}

export type LineSyntax =
  RowSyntax | AssignmentsSyntax | PlaceSyntax | EventSyntax | BlankSyntax | BrokenSyntax;

/** A network text as it is written, line by line. */
export interface NetworkTree {
  readonly lines: readonly LineSyntax[];
}
