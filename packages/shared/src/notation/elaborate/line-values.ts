import type { ExpressionSyntax } from '../../expression/syntax.ts';
import type { LineSyntax } from '../ast.ts';

/** The values that a line gives, in order of writing. */
export function valuesOf(line: LineSyntax): readonly ExpressionSyntax[] {
  switch (line.kind) {
    case 'row':
      return line.items.flatMap((item) => (item.value ? [item.value] : []));
    case 'start':
    case 'let':
    case 'fix':
    case 'volume':
    case 'weight':
    case 'rate':
      return line.items.map((item) => item.value);
    case 'event':
      return [line.when, ...line.set.map((item) => item.value)];
    default:
      return [];
  }
}
