import type { AnnihilationCheck } from '../annihilates.ts';
import { primitiveWithPositiveLead } from '../integers.ts';
import type { SparseVector } from '../sparse.ts';
import type { PrimeField } from './field.ts';
import { inverseResidue, residueOf } from './field.ts';
import { combineResidues, liftLong, liftShort } from './lift.ts';
import type { ModularKernel } from './modular-kernel.ts';

/** One kernel vector that no lift has proven yet: its residues modulo the product of the primes seen so far. */
interface OpenVector {
  readonly parameter: number;
  residues: Map<number, bigint>;
}

/**
 * Brings kernel vectors known modulo primes to the integers and keeps those that are verified there. All primes must give
 * the same rank and the same parameters, so that they speak of the same rational vectors.
 */
export class ModularLift {
  readonly rank: number;
  readonly #check: AnnihilationCheck;
  readonly #parameters: Int32Array;
  readonly #proven = new Map<number, SparseVector>();
  #open: OpenVector[] | null = null;
  #modulus = 1n;

  constructor(kernel: ModularKernel, check: AnnihilationCheck) {
    this.rank = kernel.rank;
    this.#check = check;
    this.#parameters = kernel.parameters;
  }

  /** Takes the kernel modulo one more prime into account; true once every vector is proven. */
  include(kernel: ModularKernel, field: PrimeField): boolean {
    if (!this.#matches(kernel)) return false;
    if (this.#open === null) this.#first(kernel, field);
    else this.#next(kernel, field);
    return this.#open!.length === 0;
  }

  /** The verified vectors, in the order of their parameters. */
  proven(): SparseVector[] {
    return [...this.#proven.entries()].sort((a, b) => a[0] - b[0]).map(([, vector]) => vector);
  }

  #matches(kernel: ModularKernel): boolean {
    return (
      kernel.rank === this.rank &&
      kernel.parameters.every((parameter, j) => parameter === this.#parameters[j])
    );
  }

  #first(kernel: ModularKernel, field: PrimeField): void {
    const columns = columnsOf(kernel);
    this.#open = [];
    this.#modulus = BigInt(field.p);
    columns.forEach(({ rows, residues }, j) => {
      const parameter = this.#parameters[j]!;
      const lifted = liftShort(residues, field.p);
      if (lifted !== null && this.#accept(parameter, rows, lifted)) return;
      this.#open!.push({
        parameter: j,
        residues: new Map(rows.map((row, i) => [row, BigInt(residues[i]!)])),
      });
    });
  }

  #next(kernel: ModularKernel, field: PrimeField): void {
    const columns = columnsOf(kernel);
    const p = BigInt(field.p);
    const inverse = BigInt(inverseResidue(residueOf(Number(this.#modulus % p), field.p), field.p));
    for (const vector of this.#open!) {
      const { rows, residues } = columns[vector.parameter]!;
      const combined = new Map<number, bigint>();
      const fresh = new Map(rows.map((row, i) => [row, BigInt(residues[i]!)]));
      for (const row of new Set([...vector.residues.keys(), ...rows])) {
        const x = vector.residues.get(row) ?? 0n;
        combined.set(row, combineResidues(x, this.#modulus, fresh.get(row) ?? 0n, p, inverse));
      }
      vector.residues = combined;
    }
    this.#modulus *= p;
    this.#open = this.#open!.filter((vector) => {
      const rows = [...vector.residues.keys()].sort((a, b) => a - b);
      const lifted = liftLong(
        rows.map((row) => vector.residues.get(row)!),
        this.#modulus,
      );
      return lifted === null || !this.#accept(this.#parameters[vector.parameter]!, rows, lifted);
    });
  }

  #accept(parameter: number, rows: readonly number[], lifted: readonly bigint[]): boolean {
    const kept = rows.filter((_, i) => lifted[i] !== 0n);
    const values = primitiveWithPositiveLead(lifted.filter((value) => value !== 0n));
    const vector: SparseVector = { indices: Int32Array.from(kept), values };
    if (!kept.includes(parameter) || !this.#check.holds(vector)) return false;
    this.#proven.set(parameter, vector);
    return true;
  }
}

/** The kernel vectors by parameter, rows ascending. */
function columnsOf(kernel: ModularKernel): { rows: number[]; residues: number[] }[] {
  const columns = Array.from(kernel.parameters, () => ({ rows: [] as number[], residues: [] as number[] }));
  const rowCount = kernel.rank + kernel.parameters.length;
  for (let row = 0; row < rowCount; row++) {
    kernel.forms.forEach(row, (parameter, residue) => {
      columns[parameter]!.rows.push(row);
      columns[parameter]!.residues.push(residue);
    });
  }
  return columns;
}
