import type { Expression } from './expression.ts';
import type { ExpressionSyntax } from './syntax.ts';

/** The parts of an expression one level down. */
export function partsOf(expression: Expression): readonly Expression[] {
  switch (expression.kind) {
    case 'number':
    case 'name':
      return [];
    case 'negate':
    case 'not':
      return [expression.of];
    case 'binary':
    case 'compare':
    case 'logic':
      return [expression.left, expression.right];
    case 'call':
      return expression.arguments;
  }
}

/** The names that an expression uses, each once, in order of first use. */
export function freeNames(expression: Expression): string[] {
  const names = new Set<string>();
  const visit = (part: Expression): void => {
    if (part.kind === 'name') names.add(part.name);
    else partsOf(part).forEach(visit);
  };
  visit(expression);
  return [...names];
}

/** The parts of a written expression one level down, with indices and bounds. */
export function syntaxParts(expression: ExpressionSyntax): readonly ExpressionSyntax[] {
  switch (expression.kind) {
    case 'number':
      return [];
    case 'name':
      return expression.indices ?? [];
    case 'negate':
    case 'not':
    case 'measured':
      return [expression.of];
    case 'binary':
    case 'compare':
    case 'logic':
      return [expression.left, expression.right];
    case 'call':
      return expression.arguments;
    case 'sum':
      return [...expression.ranges.flatMap((range) => [range.first, range.last]), expression.of];
  }
}

/** Calls `visit` for an expression and all its parts, in order of writing. */
export function walkSyntax(expression: ExpressionSyntax, visit: (part: ExpressionSyntax) => void): void {
  visit(expression);
  for (const part of syntaxParts(expression)) walkSyntax(part, visit);
}
