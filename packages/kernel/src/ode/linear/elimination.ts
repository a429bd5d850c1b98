import type { Routine } from '../../program/index.ts';
import type { SparsePattern } from '../problem.ts';
import { pivotingSolver } from './pivoting.ts';
import { factorizeSymbolically, type SymbolicFactorization } from './symbolic.ts';
import { tableSolver } from './table.ts';
import { factorLength, unrolledFactor, unrolledSolve } from './unrolled.ts';

/** Factorisations of more multiply-subtract operations, or of larger systems, are driven by tables. */
const unrolledWork = 4000;
const unrolledSize = 1000;

/** How shift · I − J is factorised: written out where that is short, else by tables that are made when first needed. */
export interface Elimination {
  readonly pattern: SparsePattern;
  readonly unrolled: boolean;
  /** Numbers that the unrolled routines keep. */
  readonly factorLength: number;
  readonly symbolic: () => SymbolicFactorization;
}

/** `checkpoint` may throw to end the search for an order, now or when it is first needed. */
export function planElimination(pattern: SparsePattern, checkpoint?: () => void): Elimination {
  let known: SymbolicFactorization | null = null;
  const symbolic = (): SymbolicFactorization => (known ??= factorizeSymbolically(pattern, checkpoint));
  const unrolled = pattern.size <= unrolledSize && symbolic().work <= unrolledWork;
  return { pattern, unrolled, factorLength: unrolled ? factorLength(symbolic()) : 0, symbolic };
}

/** Slots and regions (by first slot) that the routines use. */
export interface EliminationPlaces {
  readonly shift: number;
  /** Gets the largest multiplier, NaN where the matrix is singular or not finite. */
  readonly growth: number;
  readonly factors: number;
  /** Added to the right-hand side of every solve. */
  readonly addend: number;
}

/**
 * Factor routines read the entries of J at their first base; solve routines solve for the vector at their first base
 * plus the addend and write at their second. "Pivoting" ones choose pivots by size, the others keep a fixed order.
 */
export interface EliminationRoutines {
  readonly factor: Routine;
  readonly solve: Routine;
  readonly factorPivoting: Routine;
  readonly solvePivoting: Routine;
}

export function eliminationRoutines(
  plan: Elimination,
  places: EliminationPlaces,
  memory: Float64Array,
): EliminationRoutines {
  return { ...fixedRoutines(plan, places, memory), ...pivotingRoutines(plan, places, memory) };
}

function fixedRoutines(
  { pattern, unrolled, symbolic }: Elimination,
  places: EliminationPlaces,
  memory: Float64Array,
): Pick<EliminationRoutines, 'factor' | 'solve'> {
  if (unrolled) {
    const factor = unrolledFactor(pattern, symbolic(), places.shift, places.growth);
    const solve = unrolledSolve(symbolic(), places.factors, places.addend);
    return { factor: { kind: 'straight', tapes: [factor] }, solve: { kind: 'straight', tapes: [solve] } };
  }
  const views = new Views(pattern, places.addend, memory);
  const table = lazy(() => tableSolver(pattern, symbolic()));
  return {
    factor: {
      kind: 'host',
      run: (entries = 0) => {
        memory[places.growth] = table().factor(views.entries(entries), memory[places.shift]!);
      },
    },
    solve: { kind: 'host', run: (b = 0, x = 0) => table().solve(views.withAddend(b), views.vector(x)) },
  };
}

function pivotingRoutines(
  { pattern, symbolic }: Elimination,
  places: EliminationPlaces,
  memory: Float64Array,
): Pick<EliminationRoutines, 'factorPivoting' | 'solvePivoting'> {
  const views = new Views(pattern, places.addend, memory);
  const solver = lazy(() => pivotingSolver(pattern, symbolic().order));
  let regular = false;
  return {
    factorPivoting: {
      kind: 'host',
      run: (entries = 0) => {
        regular = solver().factor(views.entries(entries), memory[places.shift]!);
        memory[places.growth] = regular ? 0 : NaN;
      },
    },
    solvePivoting: {
      kind: 'host',
      run: (b = 0, x = 0) => {
        const sum = views.withAddend(b);
        if (regular) solver().solve(sum);
        else sum.fill(NaN);
        views.vector(x).set(sum);
      },
    },
  };
}

/** Vectors of a program's memory by their first slot. */
class Views {
  private readonly pattern: SparsePattern;
  private readonly addend: number;
  private readonly memory: Float64Array;
  private readonly sum: Float64Array;

  constructor(pattern: SparsePattern, addend: number, memory: Float64Array) {
    this.pattern = pattern;
    this.addend = addend;
    this.memory = memory;
    this.sum = new Float64Array(pattern.size);
  }

  entries(slot: number): Float64Array {
    return this.memory.subarray(slot, slot + this.pattern.columns.length);
  }

  vector(slot: number): Float64Array {
    return this.memory.subarray(slot, slot + this.pattern.size);
  }

  /** The vector at a slot plus the addend; reused by the next call. */
  withAddend(slot: number): Float64Array {
    const { sum, memory, addend } = this;
    for (let i = 0; i < sum.length; i++) sum[i] = memory[slot + i]! + memory[addend + i]!;
    return sum;
  }
}

function lazy<T>(make: () => T): () => T {
  let made: { value: T } | null = null;
  return () => (made ??= { value: make() }).value;
}
