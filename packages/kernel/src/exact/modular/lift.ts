/**
 * Integers on the line of a vector known modulo p: finds one denominator D with D·residue close to 0 modulo p for every
 * entry, |D| and |D·entry| at most √(p/2) (rational reconstruction: Wang 1981). Null where entries are longer. The
 * result is a proposal: the caller verifies it.
 */
export function liftShort(residues: readonly number[], p: number): bigint[] | null {
  const bound = Math.floor(Math.sqrt(p / 2));
  let denominator = 1;
  const lifted: number[] = [];
  for (const residue of residues) {
    const numerator = centred((residue * denominator) % p, p);
    if (Math.abs(numerator) <= bound) {
      lifted.push(numerator);
      continue;
    }
    const fraction = reconstructShort((residue * denominator) % p, p, bound);
    if (fraction === null) return null;
    denominator *= fraction.denominator;
    if (denominator > bound) return null;
    for (let i = 0; i < lifted.length; i++) {
      lifted[i]! *= fraction.denominator;
      if (Math.abs(lifted[i]!) > bound) return null;
    }
    lifted.push(fraction.numerator);
  }
  return lifted.map(BigInt);
}

/** The same for a modulus of any length. */
export function liftLong(residues: readonly bigint[], modulus: bigint): bigint[] | null {
  const bound = squareRoot(modulus / 2n);
  let denominator = 1n;
  let lifted: bigint[] = [];
  for (const residue of residues) {
    const scaled = (residue * denominator) % modulus;
    const numerator = 2n * scaled > modulus ? scaled - modulus : scaled;
    if (numerator <= bound && -numerator <= bound) {
      lifted.push(numerator);
      continue;
    }
    const fraction = reconstructLong(scaled, modulus, bound);
    if (fraction === null) return null;
    denominator *= fraction.denominator;
    if (denominator > bound) return null;
    lifted = lifted.map((value) => value * fraction.denominator);
    lifted.push(fraction.numerator);
  }
  return lifted;
}

/** The residue modulo a·b that is `x` modulo a and `y` modulo b (Chinese remainder; a and b coprime). */
export function combineResidues(x: bigint, a: bigint, y: bigint, b: bigint, inverseOfA: bigint): bigint {
  const step = ((((y - x) % b) + b) * inverseOfA) % b;
  return x + a * step;
}

function centred(residue: number, p: number): number {
  return 2 * residue > p ? residue - p : residue;
}

function reconstructShort(
  residue: number,
  p: number,
  bound: number,
): { numerator: number; denominator: number } | null {
  let [r0, r1, t0, t1] = [p, residue, 0, 1];
  while (r1 > bound) {
    const quotient = Math.floor(r0 / r1);
    [r0, r1] = [r1, r0 - quotient * r1];
    [t0, t1] = [t1, t0 - quotient * t1];
  }
  if (t1 === 0 || Math.abs(t1) > bound) return null;
  return t1 < 0 ? { numerator: -r1, denominator: -t1 } : { numerator: r1, denominator: t1 };
}

function reconstructLong(
  residue: bigint,
  modulus: bigint,
  bound: bigint,
): { numerator: bigint; denominator: bigint } | null {
  let [r0, r1, t0, t1] = [modulus, residue, 0n, 1n];
  while (r1 > bound) {
    const quotient = r0 / r1;
    [r0, r1] = [r1, r0 - quotient * r1];
    [t0, t1] = [t1, t0 - quotient * t1];
  }
  if (t1 === 0n || t1 > bound || -t1 > bound) return null;
  return t1 < 0n ? { numerator: -r1, denominator: -t1 } : { numerator: r1, denominator: t1 };
}

/** Integer square root, rounded down (Newton). */
function squareRoot(value: bigint): bigint {
  if (value < 2n) return value;
  let guess = 1n << BigInt((value.toString(2).length + 1) >> 1);
  for (;;) {
    const next = (guess + value / guess) >> 1n;
    if (next >= guess) return guess;
    guess = next;
  }
}
