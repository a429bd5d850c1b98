import type { VerdictId } from '@stillroom/shared/cells';
import { atMostOne } from './at-most-one.ts';
import { complexBalance } from './complex-balance.ts';
import { concordant } from './concordant.ts';
import { deficiencyOne } from './deficiency-one.ts';
import { deficiencyZero } from './deficiency-zero.ts';
import { detailedBalance } from './detailed-balance.ts';
import { existence } from './existence.ts';
import { globalStability } from './global-stability.ts';
import { injective } from './injective.ts';
import { noBoundarySteadyState } from './no-boundary-steady-state.ts';
import { noPositiveSteadyState } from './no-positive-steady-state.ts';
import { persistence } from './persistence.ts';
import { robustExtinction } from './robust-extinction.ts';
import { robustSpecies } from './robust-species.ts';
import { severalSteadyStates } from './several-steady-states.ts';
import { productFormAllTimes } from './product-form-all-times.ts';
import { productForm } from './product-form.ts';
import { positiveRecurrent } from './positive-recurrent.ts';
import { oneDimensional } from './one-dimensional.ts';
import { nonExplosive } from './non-explosive.ts';
import { monomolecular } from './monomolecular.ts';
import { massTransport } from './mass-transport.ts';
import type { Theorem } from './theorem.ts';

/** Every theorem, in the order in which verdicts are listed. To add one, write its file and name it here. */
export const theorems: readonly Theorem[] = [
  deficiencyZero,
  deficiencyOne,
  complexBalance,
  detailedBalance,
  globalStability,
  existence,
  noPositiveSteadyState,
  severalSteadyStates,
  atMostOne,
  injective,
  concordant,
  oneDimensional,
  persistence,
  noBoundarySteadyState,
  robustSpecies,
  robustExtinction,
  productForm,
  productFormAllTimes,
  monomolecular,
  massTransport,
  nonExplosive,
  positiveRecurrent,
];

const byId: ReadonlyMap<VerdictId, Theorem> = new Map(theorems.map((theorem) => [theorem.id, theorem]));

/** The theorem of a name; asking for one that is not listed is a caller's mistake. */
export function theoremOf(id: VerdictId): Theorem {
  const theorem = byId.get(id);
  if (theorem === undefined) throw new RangeError(`There is no theorem "${id}".`);
  return theorem;
}
