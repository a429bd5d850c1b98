import { echelon, matrixOfRows } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import type { SignRow } from './domain.ts';
import { ANY, narrowRow, NAUGHT, NEGATIVE, POSITIVE } from './domain.ts';

/**
 * The sign conditions behind injectivity and concordance. Unknowns 0 … m − 1 are the signs of a vector σ in the
 * stoichiometric subspace, m … m + r − 1 those of a vector α in the kernel of N. For each arrow: α is 0 where all
 * reactants have σ = 0, has the sign of σ where no two reactants have opposite signs, and is free otherwise.
 */
export interface SignSystem {
  readonly species: number;
  readonly arrows: number;
  /** Reactant species by arrow. */
  readonly reactants: readonly Int32Array[];
  readonly rows: readonly SignRow[];
  /** Rows and arrows that an unknown occurs in; arrow a is filed as −1 − a. */
  readonly uses: readonly (readonly number[])[];
}

/** Builds the system with the rows of N and of its echelon form for α, conservation laws for σ. */
export function signSystem(context: TheoremContext): SignSystem {
  const species = context.species.length;
  const arrows = context.arrows.length;
  const reactants = context.arrows.map(({ from }) =>
    Int32Array.from(context.terms(from), (term) => term.species),
  );
  const n = context.stoichiometricMatrix;
  const rows = [
    ...n.entries.map((row) => signRow(row, species)),
    ...echelon(n).rows.map((row) => signRow(row, species)),
    ...context.lawBasis.map((law) => signRow(law, 0)),
    ...echelon(matrixOfRows(context.lawBasis, species)).rows.map((law) => signRow(law, 0)),
  ];
  const uses: number[][] = Array.from({ length: species + arrows }, () => []);
  rows.forEach((row, r) => row.unknowns.forEach((unknown) => uses[unknown]!.push(r)));
  reactants.forEach((list, arrow) => {
    uses[species + arrow]!.push(-1 - arrow);
    list.forEach((i) => uses[i]!.push(-1 - arrow));
  });
  return { species, arrows, reactants, rows, uses };
}

function signRow(row: readonly bigint[], shift: number): SignRow {
  const support = row.map((_, k) => k).filter((k) => row[k] !== 0n);
  return {
    unknowns: Int32Array.from(support, (k) => k + shift),
    signs: Int8Array.from(support, (k) => (row[k]! > 0n ? 1 : -1)),
  };
}

/** Narrows all domains from the unknowns that changed until nothing moves; false where a domain runs empty. */
export function propagate(system: SignSystem, domains: Uint8Array, changed: readonly number[]): boolean {
  const queue = [...changed];
  while (queue.length > 0) {
    const unknown = queue.pop()!;
    for (const use of system.uses[unknown]!) {
      const possible =
        use >= 0
          ? narrowRow(system.rows[use]!, domains, queue)
          : narrowArrow(system, -1 - use, domains, queue);
      if (!possible) return false;
    }
  }
  return true;
}

function narrowArrow(system: SignSystem, arrow: number, domains: Uint8Array, touched: number[]): boolean {
  const list = system.reactants[arrow]!;
  const flux = system.species + arrow;
  const possible = fluxSigns(list, domains) & domains[flux]!;
  if (possible === 0) return false;
  if (possible !== domains[flux]) {
    domains[flux] = possible;
    touched.push(flux);
  }
  for (const i of list) {
    const before = domains[i]!;
    let after = 0;
    for (const sign of [NEGATIVE, NAUGHT, POSITIVE]) {
      if ((before & sign) === 0) continue;
      domains[i] = sign;
      if (fluxSigns(list, domains) & domains[flux]!) after |= sign;
    }
    domains[i] = after;
    if (after === 0) return false;
    if (after !== before) touched.push(i);
  }
  return true;
}

/** The signs α may have on an arrow, given the domains of its reactants. */
function fluxSigns(reactants: Int32Array, domains: Uint8Array): number {
  let rising = 0;
  let falling = 0;
  let either = 0;
  let allNaught = true;
  for (const i of reactants) {
    const domain = domains[i]!;
    if (domain & POSITIVE) rising++;
    if (domain & NEGATIVE) falling++;
    if ((domain & POSITIVE) !== 0 && (domain & NEGATIVE) !== 0) either++;
    if ((domain & NAUGHT) === 0) allNaught = false;
  }
  // Opposite signs need two reactants, one that can rise and another that can fall.
  const mixed = rising > 0 && falling > 0 && !(rising === 1 && falling === 1 && either === 1);
  return (rising > 0 ? POSITIVE : 0) | (falling > 0 ? NEGATIVE : 0) | (allNaught || mixed ? NAUGHT : 0);
}

/** Domains before anything is known. */
export function openDomains(system: SignSystem): Uint8Array {
  return new Uint8Array(system.species + system.arrows).fill(ANY);
}
