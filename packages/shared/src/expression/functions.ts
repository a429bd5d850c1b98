import { exp } from './elementary/exponential.ts';
import { cosh, sinh, tanh } from './elementary/hyperbolic.ts';
import { acos, asin, atan } from './elementary/inverse-trigonometric.ts';
import { ln, log10 } from './elementary/logarithm.ts';
import { hill, pow } from './elementary/power.ts';
import { cos, sin, tan } from './elementary/trigonometric.ts';

/** The nearest integer, halves to the even one. */
function round(x: number): number {
  if (!Number.isFinite(x) || Math.abs(x) >= 2 ** 52) return x;
  const below = Math.floor(x);
  const rest = x - below;
  const isUp = rest > 0.5 || (rest === 0.5 && below % 2 !== 0);
  const nearest = isUp ? below + 1 : below;
  return nearest === 0 && x < 0 ? -0 : nearest;
}

/**
 * The functions of results, from + - * / and square roots alone: IEEE 754 fixes every bit of them, where the functions of
 * `Math` may change with the machine and its version. Errors are below one unit in the last place.
 */
export const elementary = {
  exp,
  ln,
  log10,
  pow,
  sqrt: (x: number): number => Math.sqrt(x),
  abs: (x: number): number => Math.abs(x),
  sin,
  cos,
  tan,
  asin,
  acos,
  atan,
  sinh,
  cosh,
  tanh,
  floor: (x: number): number => Math.floor(x),
  ceil: (x: number): number => -Math.floor(-x),
  round,
  hill,
} as const;
