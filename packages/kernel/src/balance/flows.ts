import { elementary } from '@stillroom/shared/expression';
import type { TheoremContext } from '../theorems/context.ts';
import type { ReversiblePair } from './detailed-conditions.ts';

/** The rate of every arrow at a state. */
export function fluxesAt(
  context: TheoremContext,
  constants: readonly number[],
  x: readonly number[],
): number[] {
  return context.arrows.map(({ from }, arrow) =>
    context
      .terms(from)
      .reduce(
        (rate, { species, coefficient }) => rate * powerOf(x[species]!, coefficient),
        constants[arrow]!,
      ),
  );
}

/** Exponents up to which powers are multiplied out. */
const HIGHEST = 100;

function powerOf(base: number, exponent: number): number {
  if (!Number.isInteger(exponent) || exponent > HIGHEST)
    return elementary.exp(exponent * elementary.ln(base));
  let value = 1;
  for (let k = 0; k < exponent; k++) value *= base;
  return value;
}

/** Largest |inflow − outflow| / max(inflow, outflow) over the complexes; 0 exactly at complex-balanced states. */
export function complexResidual(context: TheoremContext, fluxes: readonly number[]): number {
  const inflow = new Array<number>(context.complexCount).fill(0);
  const outflow = new Array<number>(context.complexCount).fill(0);
  context.arrows.forEach(({ from, to }, arrow) => {
    outflow[from]! += fluxes[arrow]!;
    inflow[to]! += fluxes[arrow]!;
  });
  return inflow.reduce((largest, value, complex) => {
    const most = Math.max(value, outflow[complex]!);
    return most > 0 ? Math.max(largest, Math.abs(value - outflow[complex]!) / most) : largest;
  }, 0);
}

/** Σ (J+ − J−) ln(J+/J−) over reversible pairs, in units of amount per time (Schnakenberg 1976; Hill 1977). */
export function entropyProductionOf(pairs: readonly ReversiblePair[], fluxes: readonly number[]): number {
  return pairs.reduce((sum, { forward, backward }) => {
    const ahead = fluxes[forward]!;
    const back = fluxes[backward]!;
    return ahead === back ? sum : sum + (ahead - back) * elementary.ln(ahead / back);
  }, 0);
}
