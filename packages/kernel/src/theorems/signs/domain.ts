/** The signs an unknown may still take, as a set of three bits. */
export type Domain = number;

export const NEGATIVE = 1;
export const NAUGHT = 2;
export const POSITIVE = 4;
export const ANY = 7;

/** The domain of the negated unknown. */
export function mirror(domain: Domain): Domain {
  return ((domain & 1) << 2) | (domain & 2) | ((domain & 4) >> 2);
}

/** Whether one sign only is left. */
export function settled(domain: Domain): boolean {
  return (domain & (domain - 1)) === 0;
}

/** A linear equation Σ c_k x_k = 0 as far as signs see it. */
export interface SignRow {
  readonly unknowns: Int32Array;
  /** 1 where the coefficient is positive, −1 where it is negative. */
  readonly signs: Int8Array;
}

/**
 * Narrows the domains of one equation: a term may be positive only if another can be negative and conversely, and may
 * be zero only if the others can cancel. False where nothing is left. `touched` collects the unknowns that changed.
 */
export function narrowRow(row: SignRow, domains: Uint8Array, touched: number[]): boolean {
  const { unknowns, signs } = row;
  let canRise = 0;
  let canFall = 0;
  let mustRise = 0;
  let mustFall = 0;
  for (let k = 0; k < unknowns.length; k++) {
    const domain = signs[k]! > 0 ? domains[unknowns[k]!]! : mirror(domains[unknowns[k]!]!);
    if (domain & POSITIVE) canRise++;
    if (domain & NEGATIVE) canFall++;
    if (domain === POSITIVE) mustRise++;
    if (domain === NEGATIVE) mustFall++;
  }
  for (let k = 0; k < unknowns.length; k++) {
    const unknown = unknowns[k]!;
    const before = signs[k]! > 0 ? domains[unknown]! : mirror(domains[unknown]!);
    const othersRise = canRise - (before & POSITIVE ? 1 : 0);
    const othersFall = canFall - (before & NEGATIVE ? 1 : 0);
    const othersMustRise = mustRise - (before === POSITIVE ? 1 : 0);
    const othersMustFall = mustFall - (before === NEGATIVE ? 1 : 0);
    let after = before;
    if (othersFall === 0) after &= ~POSITIVE;
    if (othersRise === 0) after &= ~NEGATIVE;
    if ((othersMustRise > 0 && othersFall === 0) || (othersMustFall > 0 && othersRise === 0))
      after &= ~NAUGHT;
    if (after === before) continue;
    if (after === 0) return false;
    domains[unknown] = signs[k]! > 0 ? after : mirror(after);
    touched.push(unknown);
    return narrowRow(row, domains, touched);
  }
  return true;
}
