import type { Tape } from '../program/index.ts';

/** The slot of the time at which a system's tapes are evaluated. */
export const timeSlot = 0;

/** Slots 1 to 15 belong to the methods (steps.ts); a system's parameters follow. */
const firstParameterSlot = 16;

/** The slot of parameter number `index`. */
export function parameterSlot(index: number): number {
  return firstParameterSlot + index;
}

/** A sparse square matrix's places by rows: row i has the ascending columns `columns[rowStart[i] .. rowStart[i + 1] - 1]`. */
export interface SparsePattern {
  readonly size: number;
  readonly rowStart: Int32Array;
  readonly columns: Int32Array;
}

/**
 * An initial value problem dy/dt = f(t, y, p) as routines. Every tape reads the state at its first base, the time and
 * the parameters at their fixed slots, and writes at its second base.
 */
export interface OdeSystem {
  readonly dimension: number;
  readonly parameters: number;
  /** Writes f, `dimension` numbers. */
  readonly rightHandSide: readonly Tape[];
  /** Writes the entries of ∂f/∂y in the order of `pattern`. */
  readonly jacobian: readonly Tape[];
  readonly pattern: SparsePattern;
  /** Whether f depends on the time, smoothly or not. */
  readonly timeDependent: boolean;
  /** Writes ∂f/∂t; null where f does not depend on the time. */
  readonly timeDerivative: readonly Tape[] | null;
  /** Further functions of state and time, by name: event functions, outputs. */
  readonly functions: readonly SystemFunction[];
}

/** A function of state and time that the system offers besides its right-hand side. */
export interface SystemFunction {
  readonly name: string;
  /** How many numbers it writes at its second base. */
  readonly length: number;
  readonly tapes: readonly Tape[];
}
