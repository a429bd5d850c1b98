import { evaluate } from '../../expression/evaluate.ts';
import type { Expression } from '../../expression/expression.ts';
import { freeNames } from '../../expression/names.ts';
import type { AssignmentSyntax } from '../ast.ts';
import type { Elaboration } from './stage.ts';

/** A weight is looked at for these counts; beyond them the cell that counts looks. */
const COUNTS = 100;

/** A weight uses constants and n alone and is positive from n = 1 on. */
export function checkWeight(
  stage: Elaboration,
  species: string,
  weight: Expression,
  item: AssignmentSyntax,
): void {
  const names = freeNames(weight).filter((name) => name !== 'n');
  const quantities = new Map(names.map((name) => [name, stage.values.of(name)?.value]));
  const { complaints } = stage;
  const moving = names.find((name) => name === 't' || stage.values.definition(name) === undefined);
  if (moving !== undefined) {
    complaints.error(item.value, `A weight uses n and constants with a value; ${moving} is neither.`);
    return;
  }
  for (let n = 1; n <= COUNTS; n += 1) {
    const value = evaluate(weight, (name) => (name === 'n' ? n : (quantities.get(name) ?? NaN)));
    if (value > 0 && Number.isFinite(value)) continue;
    if (Number.isNaN(value)) return;
    complaints.error(
      item.value,
      `The weight of ${species} is ${value} at n = ${n}.`,
      'It must be positive from n = 1 on.',
    );
    return;
  }
}
