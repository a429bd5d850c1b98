import type { AssignmentSyntax, NetworkTree } from '../ast.ts';
import type { Complaints } from '../complaints.ts';
import type { Declarations } from './declarations.ts';
import { compileFamily } from './families.ts';
import type { IntegerNames } from './integers.ts';
import type { NameTable } from './name-table.ts';
import type { Resolver } from './resolver.ts';
import type { ResultUnits } from './result-units.ts';
import type { RowWriter } from './rows.ts';
import { memberScope } from './scope.ts';
import type { Scope } from './scope.ts';
import type { Values } from './values.ts';

/** What the stages of elaboration share. */
export interface Elaboration {
  readonly tree: NetworkTree;
  readonly complaints: Complaints;
  readonly declarations: Declarations;
  readonly species: NameTable;
  readonly constants: NameTable;
  readonly outputs: NameTable;
  readonly units: ResultUnits;
  readonly integers: IntegerNames;
  readonly resolver: Resolver;
  readonly values: Values;
  readonly rows: RowWriter;
  /** Line of the first use or the value of each constant. */
  readonly constantLines: number[];
}

/** A `let` of species or time that waits until all names are known. */
export interface OutputJob {
  readonly name: string;
  readonly item: AssignmentSyntax;
  readonly scope: Scope;
}

/** Calls `visit` for each target of a statement, once per member where it has a `for`. */
export function forEachTarget(
  stage: Elaboration,
  line: { readonly items: readonly AssignmentSyntax[] },
  visit: (base: string, indices: number[], item: AssignmentSyntax, scope: Scope) => void,
): void {
  for (const item of line.items) {
    try {
      const family = compileFamily(item.family, stage.integers, 1, 'values');
      family.forEach((values) => {
        const scope = memberScope(family.slots, values);
        visit(item.target.name, stage.resolver.indicesOf(item.target.indices, scope), item, scope);
      });
    } catch (thrown) {
      stage.complaints.failure(thrown);
    }
  }
}
