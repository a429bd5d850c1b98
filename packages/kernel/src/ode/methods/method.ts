import type { Assembly, Routine } from '../../program/index.ts';
import type { Controller } from '../controllers/controller.ts';
import type { OdeSystem } from '../problem.ts';
import type { CommonWorkspace, Layout } from '../workspace.ts';

/** Counts of the work done, as results show them. */
export interface Counters {
  rhs: number;
  jacobians: number;
  factorizations: number;
}

/** A method at work on one assembly: from the state and time of a step to the next state. */
export interface Stepper {
  /** The state or the parameters changed outside, or the method takes over: nothing from earlier steps holds. */
  restart(): void;
  /** Tries a step from time t; gives the scaled error, NaN where something is not finite. The result stands in `next`. */
  attempt(t: number, h: number): number;
  /** The state at t + θh of the step just tried, 0 ≤ θ ≤ 1, before `accept`. */
  interpolate(theta: number, out: Float64Array): void;
  /** Makes `next` the state. */
  accept(): void;
  /** h|λ| as far as the stages of the last step show it; a method for stiff systems has no need of it. */
  stiffness?(): number;
}

/** An integration method: its facts, its memory, its routines, and itself at work. */
export interface Method {
  readonly name: string;
  readonly citation: string;
  readonly order: number;
  /** Order of the dense output. */
  readonly denseOrder: number;
  readonly stiff: boolean;
  /** The power of h in the error estimate. */
  readonly errorPower: number;
  controller(): Controller;
  /** Reserves memory and gives the routines and the stepper that use it. `checkpoint` may throw to end long work. */
  prepare(system: OdeSystem, common: CommonWorkspace, layout: Layout, checkpoint: () => void): PreparedMethod;
}

export interface PreparedMethod {
  routines(memory: Float64Array): ReadonlyMap<string, Routine>;
  stepper(assembly: Assembly, counters: Counters): Stepper;
}
