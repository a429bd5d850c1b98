import type { Constant, Network } from '../../network/network.ts';
import type { AssignmentsSyntax, NetworkTree } from '../ast.ts';
import type { Complaints } from '../complaints.ts';
import { Declarations } from './declarations.ts';
import { integerLets } from './integers.ts';
import { resolveLaws } from './laws.ts';
import { NameTable } from './name-table.ts';
import { Resolver } from './resolver.ts';
import { ResultUnits } from './result-units.ts';
import { RowWriter } from './rows.ts';
import { forEachTarget } from './stage.ts';
import type { Elaboration, OutputJob } from './stage.ts';
import { elaborateStatements } from './statements.ts';
import { Dimensions } from './dimensions.ts';
import { checkRateConstants } from './rate-constants.ts';
import { checkUnits, unitsOfRates } from './unit-check.ts';
import { Values } from './values.ts';

/**
 * Turns a syntax tree into a network: names resolved, families written out, units converted, values computed. Null where
 * an error stands in the way; every error is told.
 */
export function elaborate(tree: NetworkTree, complaints: Complaints): Network | null {
  const lines = tree.lines.filter((line) => line.kind !== 'blank');
  const stage = prepare({ lines }, complaints);
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

function readConstants(stage: Elaboration, dimensions: Dimensions): Constant[] {
  const { constants, values } = stage;
  const rateUnits = unitsOfRates(stage);
  const result: Constant[] = [];
  for (let i = 0; i < constants.count; i += 1) {
    const name = constants.nameOf(i);
    const quantity = values.of(name);
    const expression = values.derivation(name);
    const line = values.definition(name)?.line ?? stage.constantLines[i] ?? 0;
    const unit = dimensions.printedUnit(name) ?? rateUnits.get(i) ?? null;
    result.push(
      expression === null ? { name, quantity, unit, line } : { name, quantity, unit, line, expression },
    );
  }
  return result;
}

function namesOf(table: NameTable): string[] {
  const names: string[] = [];
  for (let i = 0; i < table.count; i += 1) names.push(table.nameOf(i));
  return names;
}
