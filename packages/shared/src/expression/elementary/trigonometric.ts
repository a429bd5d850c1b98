import { mantissaAndExponent } from './bits.ts';
import { quickSum, quotient, rounded } from './double-double.ts';
import type { DoubleDouble } from './double-double.ts';
import { HALF_PI_PARTS } from './tables.ts';

const QUARTER_PI = 0.7853981633974483;
const INVERSE_HALF_PI = 0.6366197723675814;
/** Up to here the multiples of the parts of π/2 are exact. */
const PARTS_LIMIT = 1.5e6;
/** Nearer to a multiple of π/2 the parts hold too few bits. */
const NEAR_MULTIPLE = 2 ** -10;

interface Reduced {
  /** Which quarter turn, 0..3. */
  readonly quarter: number;
  /** What is left, within ±π/4. */
  readonly rest: DoubleDouble;
}

/** x minus the nearest multiple of π/2 (Cody, Waite 1980); exact integer arithmetic where that is not precise enough. */
function reduce(x: number): Reduced {
  if (Math.abs(x) <= QUARTER_PI) return { quarter: 0, rest: { high: x, low: 0 } };
  if (Math.abs(x) > PARTS_LIMIT) return reduceExactly(x);
  const turns = Math.floor(x * INVERSE_HALF_PI + 0.5);
  const [first, second, third] = HALF_PI_PARTS;
  const near = x - turns * first;
  const corrected = near - turns * second;
  const lost = near - corrected - turns * second;
  const rest = quickSum(corrected, lost - turns * third);
  if (Math.abs(rest.high) < NEAR_MULTIPLE) return reduceExactly(x);
  return { quarter: turns - 4 * Math.floor(turns / 4), rest };
}

/** Bits behind the point in exact reduction: enough for the double that comes nearest to a multiple of π/2. */
const FRACTION_BITS = 1300n;
/** Of those, what two doubles need of a rest that may be as small as 2^-62. */
const KEPT_BITS = 200n;
let piInBits: bigint | null = null;

/** π 2^1300 by Machin's formula, computed when it is first needed. */
function scaledPi(): bigint {
  if (piInBits === null) {
    const guard = 32n;
    const unit = 1n << (FRACTION_BITS + guard);
    piInBits = (16n * inverseArctangent(5n, unit) - 4n * inverseArctangent(239n, unit)) >> guard;
  }
  return piInBits;
}

/** unit arctan(1/n). */
function inverseArctangent(n: bigint, unit: bigint): bigint {
  let term = unit / n;
  let total = term;
  for (let k = 3n, sign = -1n; term !== 0n; k += 2n, sign = -sign) {
    term /= n * n;
    total += (sign * term) / k;
  }
  return total;
}

function reduceExactly(x: number): Reduced {
  const { mantissa, exponent } = mantissaAndExponent(Math.abs(x));
  const digits = BigInt(mantissa * 2 ** 52);
  const shift = FRACTION_BITS + BigInt(exponent - 52);
  const scaledX = shift >= 0n ? digits << shift : digits >> -shift;
  // π has to be known relative to x: for a large x its multiple is as long as x itself.
  const halfPi = scaledPi() >> 1n;
  const turns = (2n * scaledX + halfPi) / (2n * halfPi);
  const rest = scaledX - turns * halfPi;
  const kept = rest >> (FRACTION_BITS - KEPT_BITS);
  const high = Number(kept);
  const low = Number(kept - BigInt(high));
  const scale = 2 ** -Number(KEPT_BITS);
  const sign = x < 0 ? -1 : 1;
  const quarter = Number(turns & 3n) * sign;
  return {
    quarter: quarter < 0 ? quarter + 4 : quarter,
    rest: { high: sign * high * scale, low: sign * low * scale },
  };
}

/** sin on ±π/4 by its Taylor polynomial. */
function sinKernel({ high: x, low }: DoubleDouble): DoubleDouble {
  const z = x * x;
  const tail =
    -1 / 6 +
    z *
      (1 / 120 +
        z *
          (-1 / 5040 +
            z *
              (1 / 362880 +
                z *
                  (-1 / 39916800 + z * (1 / 6227020800 + z * (-1 / 1307674368000 + z / 355687428096000))))));
  return quickSum(x, x * z * tail + low * (1 - z / 2));
}

/** cos on ±π/4 by its Taylor polynomial. */
function cosKernel({ high: x, low }: DoubleDouble): DoubleDouble {
  const z = x * x;
  const half = 0.5 * z;
  const tail =
    1 / 24 +
    z *
      (-1 / 720 +
        z *
          (1 / 40320 +
            z * (-1 / 3628800 + z * (1 / 479001600 + z * (-1 / 87178291200 + z / 20922789888000)))));
  const first = 1 - half;
  const lost = 1 - first - half;
  // x x - z, the rounding of the square, from halves of x.
  return quickSum(first, lost + (z * z * tail - x * low - 0.5 * squareError(x, z)));
}

/** x² - z for z = x² rounded. */
function squareError(x: number, z: number): number {
  const split = 134217729 * x;
  const high = split - (split - x);
  const low = x - high;
  return low * low - (z - high * high - 2 * high * low);
}

/** sin and cos of any finite x. */
function sinCos(x: number): { sin: DoubleDouble; cos: DoubleDouble } {
  const { quarter, rest } = reduce(x);
  const sin = sinKernel(rest);
  const cos = cosKernel(rest);
  if (quarter === 0) return { sin, cos };
  if (quarter === 1) return { sin: cos, cos: negated(sin) };
  if (quarter === 2) return { sin: negated(sin), cos: negated(cos) };
  return { sin: negated(cos), cos: sin };
}

function negated({ high, low }: DoubleDouble): DoubleDouble {
  return { high: -high, low: -low };
}

/** The sine of x radians; NaN where x is not finite. */
export function sin(x: number): number {
  if (!Number.isFinite(x)) return NaN;
  return Math.abs(x) < 1e-8 ? x : rounded(sinCos(x).sin);
}

/** The cosine of x radians; NaN where x is not finite. */
export function cos(x: number): number {
  return Number.isFinite(x) ? rounded(sinCos(x).cos) : NaN;
}

/** The tangent of x radians; NaN where x is not finite. */
export function tan(x: number): number {
  if (!Number.isFinite(x)) return NaN;
  if (Math.abs(x) < 1e-8) return x;
  const parts = sinCos(x);
  return rounded(quotient(parts.sin, parts.cos));
}
