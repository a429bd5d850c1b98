import { parameterSlot, type OdeSystem } from './problem.ts';

/** Slots 1 to 15: numbers that a step is given or gives back. */
export const slots = {
  /** Time at which the step begins. */
  start: 1,
  /** Step size h. */
  step: 2,
  /** 1/h. */
  inverseStep: 3,
  /** 1/(hγ). */
  shift: 4,
  relativeTolerance: 5,
  /** Sum of the squared scaled errors. */
  error: 6,
  /** Largest multiplier of the last factorisation. */
  growth: 7,
  /** Squared scaled lengths from which an explicit method estimates stiffness. */
  slopeChange: 8,
  stateChange: 9,
} as const;

/** Hands out consecutive regions of a program's memory. */
export class Layout {
  private used: number;

  constructor(parameters: number) {
    this.used = parameterSlot(parameters);
  }

  /** The first slot of a new region of `length` numbers. */
  region(length: number): number {
    const start = this.used;
    this.used += length;
    return start;
  }

  get slots(): number {
    return this.used;
  }
}

/** Regions that every method uses, by their first slot. */
export interface CommonWorkspace {
  readonly dimension: number;
  /** The state at the beginning of the step, and the new state. */
  readonly state: number;
  readonly next: number;
  /** The argument of the right-hand side inside a step. */
  readonly stage: number;
  /** Absolute tolerance of each component. */
  readonly absoluteTolerance: number;
  /** A state between steps, for outputs and events. */
  readonly between: number;
  /** Entries of ∂f/∂y in the order of its pattern. */
  readonly jacobian: number;
  /** Where each further function of the system writes. */
  readonly functions: ReadonlyMap<string, number>;
}

export function commonWorkspace(system: OdeSystem, layout: Layout): CommonWorkspace {
  const vector = (): number => layout.region(system.dimension);
  return {
    dimension: system.dimension,
    state: vector(),
    next: vector(),
    stage: vector(),
    absoluteTolerance: vector(),
    between: vector(),
    jacobian: layout.region(system.pattern.columns.length),
    functions: new Map(system.functions.map(({ name, length }) => [name, layout.region(length)])),
  };
}
