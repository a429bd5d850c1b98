import type { TargetSyntax } from '../ast.ts';
import { Failure, makeIt } from '../failure.ts';
import { nearest } from '../nearest.ts';
import type { Elaboration } from './stage.ts';

/** Throws Failure for a species that occurs in no row; a silent one where a line with an error mentions it. */
export function refuseUnknownSpecies(
  stage: Elaboration,
  { target }: { readonly target: TargetSyntax },
  indices: readonly number[],
): never {
  const { declarations } = stage;
  const { name, from } = target;
  const silent = declarations.inBrokenLines.has(name);
  if (declarations.kindOf(name) === 'species') {
    const shown = indices.length > 0 ? `${name}[${indices.join(',')}]` : name;
    throw new Failure(from, target.to, `${shown} occurs in no row.`, { silent });
  }
  const meant = nearest(name, declarations.all('species'));
  throw new Failure(from, target.to, `No row has a species ${name}.`, {
    hint: meant ? null : `A constant is given by let ${name} = ….`,
    repairs: meant ? [makeIt(meant, from, from + name.length)] : [],
    silent,
  });
}
