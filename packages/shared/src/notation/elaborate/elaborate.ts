import type { Constant, Network } from '../../network/network.ts';
import type { AssignmentsSyntax, NetworkTree } from '../ast.ts';
import type { Complaints } from '../complaints.ts';
import { Declarations } from './declarations.ts';
import { compileFamily } from './families.ts';
import { integerLets } from './integers.ts';
import type { IntegerNames } from './integers.ts';
import { resolveLaws } from './laws.ts';
import { NameTable } from './name-table.ts';
import { Resolver } from './resolver.ts';
import { ResultUnits } from './result-units.ts';
import { RowWriter } from './rows.ts';
import { memberScope } from './scope.ts';
import type { Scope } from './scope.ts';
import { elaborateStatements } from './statements.ts';
import { Dimensions } from './dimensions.ts';
import { checkRateConstants } from './rate-constants.ts';
import { checkUnits, unitsOfRates } from './unit-check.ts';
import { Values } from './values.ts';

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

/**
 * Turns a syntax tree into a network: names resolved, families written out, units converted, values computed. Null where
 * an error stands in the way; every error is told.
 */
export function elaborate(tree: NetworkTree, complaints: Complaints): Network | null {
  const stage = prepare(tree, complaints);
  const outputs = expandLines(stage);
  const laws = resolveLaws(stage);
  const statements = elaborateStatements(stage, outputs);
  const dimensions = new Dimensions(stage);
  const constants = readConstants(stage, dimensions);
  checkRateConstants(stage, constants);
  checkUnits(stage, dimensions, statements.amounts);
  if (complaints.hasErrors) return null;
  return {
    species: namesOf(stage.species),
    complexes: stage.rows.complexes.toTable(),
    reactions: stage.rows.toTable(laws.lawOf),
    rows: stage.rows.rows,
    constants,
    laws: laws.laws,
    ...statements.parts,
    units: stage.units.printed(),
  };
}

function prepare(tree: NetworkTree, complaints: Complaints): Elaboration {
  const declarations = new Declarations(tree, complaints);
  const species = new NameTable();
  const constants = new NameTable();
  const outputs = new NameTable();
  const units = new ResultUnits(tree);
  const integers = integerLets(declarations.plainLets, declarations.inBrokenLines);
  const resolver = new Resolver(
    declarations,
    { species, constant: constants, output: outputs },
    units,
    integers,
  );
  const values = new Values(resolver, complaints);
  const rows = new RowWriter(species, { constants, declarations, values, integers }, complaints);
  return {
    ...{
      tree,
      complaints,
      declarations,
      species,
      constants,
      outputs,
      units,
      integers,
      resolver,
      values,
      rows,
    },
    constantLines: [],
  };
}

/** A `let` of species or time that waits until all names are known. */
export interface OutputJob {
  readonly name: string;
  readonly item: AssignmentsSyntax['items'][number];
  readonly scope: Scope;
}

/** Writes out rows and takes down lets, in order of writing, so that names are numbered in order of first appearance. */
function expandLines(stage: Elaboration): OutputJob[] {
  const outputs: OutputJob[] = [];
  for (const line of stage.tree.lines) {
    if (line.kind === 'row') stage.rows.write(line);
    else if (line.kind === 'let' || line.kind === 'volume') expandLets(stage, line, outputs);
    else if (line.kind === 'rate') {
      forEachTarget(stage, line, (base, indices) => stage.species.intern(stage.species.base(base), indices));
    }
    while (stage.constantLines.length < stage.constants.count) stage.constantLines.push(line.line);
  }
  return outputs;
}

function expandLets(stage: Elaboration, line: AssignmentsSyntax, outputs: OutputJob[]): void {
  const { declarations, constants, values, complaints } = stage;
  forEachTarget(stage, line, (base, indices, item, scope) => {
    if (declarations.kindOf(base) === 'output') {
      const table = stage.outputs;
      const before = table.count;
      const number = table.intern(table.base(base), indices);
      if (number < before) complaints.error(item.target, `${table.nameOf(number)} is given twice.`);
      else outputs.push({ name: table.nameOf(number), item, scope });
      return;
    }
    if (declarations.kindOf(base) !== 'constant') return;
    const name = constants.nameOf(constants.intern(constants.base(base), indices));
    const unitsFirst = line.kind === 'volume';
    values.define(name, {
      value: item.value,
      scope: { ...scope, unitsFirst },
      at: item.target,
      line: line.line,
    });
  });
}

/** Calls `visit` for each target of a statement, once per member where it has a `for`. */
export function forEachTarget(
  stage: Elaboration,
  line: Pick<AssignmentsSyntax, 'items'>,
  visit: (base: string, indices: number[], item: AssignmentsSyntax['items'][number], scope: Scope) => void,
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

function readConstants(stage: Elaboration, dimensions: Dimensions): Constant[] {
  const { constants, values } = stage;
  const rateUnits = unitsOfRates(stage);
  const result: Constant[] = [];
  for (let i = 0; i < constants.count; i += 1) {
    const name = constants.nameOf(i);
    const quantity = values.of(name);
    const line = values.definition(name)?.line ?? stage.constantLines[i] ?? 0;
    result.push({ name, quantity, unit: dimensions.printedUnit(name) ?? rateUnits.get(i) ?? null, line });
  }
  return result;
}

function namesOf(table: NameTable): string[] {
  const names: string[] = [];
  for (let i = 0; i < table.count; i += 1) names.push(table.nameOf(i));
  return names;
}
