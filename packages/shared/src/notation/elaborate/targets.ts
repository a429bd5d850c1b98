import type { ExpressionSyntax } from '../../expression/syntax.ts';
import type { TargetSyntax } from '../ast.ts';
import { compileInteger } from './integers.ts';
import type { IntegerFunction, IntegerNames, Slots } from './integers.ts';
import type { NameTable } from './name-table.ts';
import { checkedIndex } from './resolver.ts';

export const noIndices: readonly number[] = [];

/** A function that numbers the species or constant that a target is for each member of a family. */
export function compileTarget(
  table: NameTable,
  target: TargetSyntax,
  slots: Slots,
  integers: IntegerNames,
): IntegerFunction {
  const base = table.base(target.name);
  const syntax = target.indices;
  if (!syntax) return () => table.intern(base, noIndices);
  const indices = syntax.map((index) => compileInteger(index, slots, integers));
  const scratch = indices.map(() => 0);
  return (values) => {
    for (let i = 0; i < indices.length; i += 1) {
      const value = (indices[i] as IntegerFunction)(values);
      scratch[i] = (value | 0) === value ? value : checkedIndex(value, syntax[i] as ExpressionSyntax);
    }
    return table.intern(base, scratch);
  };
}
