import { elementary } from '@stillroom/shared/expression';

/**
 * A first step size from the sizes of the state, its slope and its change of slope, all scaled by the tolerances
 * (Hairer, Nørsett, Wanner, Solving Ordinary Differential Equations I, II.4). `slopeAt(h)` is the slope after an Euler
 * step of size h. `power` is the power of h in the method's error.
 */
export function initialStep(
  state: Float64Array,
  slope: Float64Array,
  scale: Float64Array,
  slopeAt: (h: number) => Float64Array,
  power: number,
  longest: number,
): number {
  const stateSize = scaledLength(state, scale);
  const slopeSize = scaledLength(slope, scale);
  const small = stateSize < 1e-5 || slopeSize < 1e-5;
  const guess = Math.min(small ? 1e-6 : 0.01 * (stateSize / slopeSize), longest);
  const later = slopeAt(guess);
  const change = Float64Array.from(later, (value, i) => value - slope[i]!);
  const bend = scaledLength(change, scale) / guess;
  const steepest = Math.max(slopeSize, bend);
  const fine = steepest <= 1e-15 ? Math.max(1e-6, guess * 1e-3) : elementary.pow(0.01 / steepest, 1 / power);
  const step = Math.min(100 * guess, fine, longest);
  return Number.isFinite(step) && step > 0 ? step : Math.min(1e-6, longest);
}

function scaledLength(vector: Float64Array, scale: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < vector.length; i++) {
    const scaled = vector[i]! / scale[i]!;
    sum += scaled * scaled;
  }
  return vector.length === 0 ? 0 : Math.sqrt(sum / vector.length);
}
