import type { Controller } from './controllers/controller.ts';
import { EventWatch, type Firing, type OdeEvent } from './events.ts';
import { initialStep } from './initial-step.ts';
import type { Counters, Stepper } from './methods/method.ts';
import { type MethodKind, methods } from './methods/registry.ts';
import { type Outcome, PreparationStopped, type StopReason } from './outcome.ts';
import type { PreparedSystem } from './prepared-system.ts';
import { SensitivityJump, type SensitivityPlaces } from './sensitivity-jump.ts';
import { StiffnessWatch } from './stiffness.ts';
import { slots } from './workspace.ts';

/** What is asked of one run. Times ascend and lie between the start and `until`. */
export interface InitialValueProblem {
  readonly start: Float64Array;
  readonly startTime?: number;
  readonly until: number;
  readonly parameters: Float64Array;
  /** Times at which `record` is called. */
  readonly times: readonly number[];
  readonly method: 'auto' | MethodKind;
  readonly relativeTolerance: number;
  /** By component, positive. */
  readonly absoluteTolerance: Float64Array;
  readonly events?: readonly OdeEvent[];
  /** Where the state holds sensitivities, which events change in their own way. */
  readonly sensitivities?: SensitivityPlaces | null;
  /** Gets the state (a slot of memory) at each of `times`, after the events of that time. */
  readonly record: (time: number, state: number) => void;
  /** Gets the state after every step, and `jumped` after an event. */
  readonly observe?: (time: number, state: Float64Array, jumped: boolean) => void;
  /** Told the index of every event that fires. */
  readonly fired?: (time: number, event: number) => void;
  /** Asked every few steps whether to go on. */
  readonly checkpoint?: (time: number) => boolean;
  readonly mostSteps?: number;
}

const defaultMostSteps = 2_000_000;
/** Where the explicit method was asked for and is held back by stability, it is given up after so many. */
const mostStiffSteps = 100_000;
/** Steps between two calls of the checkpoint, for systems of fewer than so many components; larger ones ask every step. */
const checkpointSteps = 16;
const largeDimension = 200;
/** Steps after which "auto" looks at the rates anew. */
const rateSteps = 8;
/** A state that grew so much in the later half of the steps counts as growing without bound. */
const growthFactor = 1e3;
const eventsAtOneTime = 100;

/** The name under which a system offers the leaves of all its events, in their order. */
export const leavesFunction = 'event leaves';

/**
 * Integrates from the start to `until`. Never throws for trouble in the numbers, nor where a checkpoint inside a routine
 * ends the work: see Outcome.
 */
export function solve(prepared: PreparedSystem, problem: InitialValueProblem): Outcome {
  const run = new Run(prepared, problem);
  try {
    return run.go();
  } catch (error) {
    if (!(error instanceof PreparationStopped)) throw error;
    return run.outcome({ kind: 'stopped from outside' });
  }
}

class Run {
  private readonly prepared: PreparedSystem;
  private readonly problem: InitialValueProblem;
  private readonly counters: Counters = { rhs: 0, jacobians: 0, factorizations: 0 };
  private readonly used: string[] = [];
  private readonly state: Float64Array;
  private readonly between: Float64Array;
  private readonly stiffness = new StiffnessWatch();
  private readonly checkpointSteps: number;
  private readonly watch: EventWatch | null;
  private readonly sensitivityJump: SensitivityJump | null;
  private steppers = new Map<MethodKind, { stepper: Stepper; controller: Controller }>();
  private kind: MethodKind;
  private time: number;
  private step = 0;
  private nextSample = 0;
  private steps = 0;
  private rejected = 0;
  private fastestRate = 0;
  private sizeAtHalf: number[] = [];

  constructor(prepared: PreparedSystem, problem: InitialValueProblem) {
    this.prepared = prepared;
    this.problem = problem;
    this.kind = problem.method === 'auto' ? 'nonstiff' : problem.method;
    this.time = problem.startTime ?? 0;
    const { common } = prepared;
    this.checkpointSteps = common.dimension < largeDimension ? checkpointSteps : 1;
    this.state = prepared.vector(common.state);
    this.between = prepared.vector(common.between);
    this.state.set(problem.start);
    prepared.vector(common.absoluteTolerance).set(problem.absoluteTolerance);
    prepared.assembly.memory[slots.relativeTolerance] = problem.relativeTolerance;
    prepared.setParameters(problem.parameters);
    const events = problem.events ?? [];
    const leaves = events.reduce((sum, { leafCount }) => sum + leafCount, 0);
    this.watch = events.length === 0 ? null : new EventWatch(events, leaves, (time) => this.leavesAt(time));
    const places = problem.sensitivities ?? null;
    this.sensitivityJump =
      places === null || events.length === 0 ? null : new SensitivityJump(prepared, places);
  }

  go(): Outcome {
    this.between.set(this.state);
    this.watch?.begin(this.time);
    this.recordHere();
    this.step = this.firstStep();
    while (this.time < this.problem.until) {
      const stop = this.beforeStep() ?? this.oneStep();
      if (stop !== null) return this.outcome(stop);
    }
    return this.outcome(null);
  }

  private beforeStep(): StopReason | null {
    const stiff = this.stiffness.suspected && this.problem.method === 'nonstiff';
    const limit = this.problem.mostSteps ?? (stiff ? mostStiffSteps : defaultMostSteps);
    const tried = this.steps + this.rejected;
    if (tried >= limit) return { kind: 'too many steps', limit, stiff };
    if (tried % this.checkpointSteps === 0 && this.problem.checkpoint?.(this.time) === false) {
      return { kind: 'stopped from outside' };
    }
    return null;
  }

  /** Tries steps until one is accepted. */
  private oneStep(): StopReason | null {
    const { stepper, controller } = this.current();
    for (;;) {
      const remaining = this.problem.until - this.time;
      const last = this.step * 1.0000001 >= remaining;
      const h = last ? remaining : this.step;
      if (!last && !(this.time + h * 0.1 > this.time)) return this.tooSmall();
      const error = stepper.attempt(this.time, h);
      if (error <= 1)
        return this.accepted(stepper, controller, h, error, last ? this.problem.until : this.time + h);
      this.rejected++;
      if (error < Infinity) this.step = controller.reject(h, error);
      else this.step = h * 0.1;
      if (this.rejected % this.checkpointSteps === 0) {
        const stop = this.beforeStep();
        if (stop !== null) return stop;
      }
      if (!(this.time + this.step * 0.1 > this.time)) return this.tooSmall(!(error < Infinity));
    }
  }

  private accepted(
    stepper: Stepper,
    controller: Controller,
    h: number,
    error: number,
    reached: number,
  ): StopReason | null {
    const { observe, until } = this.problem;
    this.steps++;
    const start = this.time;
    this.toBetween = (time) =>
      stepper.interpolate(Math.min(1, (time - start) / (reached - start)), this.between);
    const firing = this.watch?.advance(start, reached, reached === until) ?? null;
    this.recordBefore(firing?.time ?? reached);
    this.step = controller.accept(h, error);
    if (firing !== null && firing.time < reached) {
      this.toBetween(firing.time);
      this.state.set(this.between);
    } else {
      stepper.accept();
    }
    this.time = firing?.time ?? reached;
    this.noteSize();
    observe?.(this.time, this.state, false);
    if (firing !== null) return this.jump(firing);
    this.considerMethod(stepper, h);
    this.recordHere();
    return null;
  }

  /** Applies events that fire now, and those that they set off. */
  private jump({ events, leaves }: Firing): StopReason | null {
    const undefinedThere = this.sensitivityJump?.begin(this.time, leaves) ?? null;
    if (undefinedThere !== null) return undefinedThere;
    let fired = events;
    for (let round = 0; fired.length > 0; round++) {
      if (round >= eventsAtOneTime) return { kind: 'event cascade' };
      for (const event of fired) this.apply(event);
      this.between.set(this.state);
      this.toBetween = () => undefined;
      fired = this.watch!.afterJump(this.time);
    }
    this.sensitivityJump?.end(this.time);
    this.problem.observe?.(this.time, this.state, true);
    for (const { stepper, controller } of this.steppers.values()) {
      stepper.restart();
      controller.reset();
    }
    this.step = this.firstStep();
    this.recordHere();
    return null;
  }

  private apply(event: OdeEvent): void {
    this.problem.fired?.(this.time, this.problem.events!.indexOf(event));
    const values = Float64Array.from(
      this.prepared.evaluate(event.values, this.time, this.prepared.common.state),
    );
    const slopes = this.sensitivityJump?.slopes(event, this.time);
    event.targets.forEach(({ kind, index }, n) => {
      if (kind === 'variable') this.state[index] = values[n]!;
      else this.prepared.setParameter(index, values[n]!);
    });
    if (slopes !== undefined) this.sensitivityJump?.apply(event, slopes);
  }

  /** Changes between the methods where "auto" was asked for and it pays. */
  private considerMethod(stepper: Stepper, h: number): void {
    const { method } = this.problem;
    if (method === 'stiff') return;
    if (this.steps % rateSteps === 0) {
      this.fastestRate = this.prepared.fastestRate(this.time, this.prepared.common.state);
      this.counters.jacobians++;
    }
    const change = this.stiffness.afterStep(this.kind, h * this.fastestRate, stepper.stiffness?.() ?? 0);
    if (method === 'nonstiff' || change === this.kind) return;
    this.kind = change;
    const next = this.current();
    next.stepper.restart();
    next.controller.reset();
  }

  private current(): { stepper: Stepper; controller: Controller } {
    let entry = this.steppers.get(this.kind);
    if (entry === undefined) {
      const stepper = this.prepared.stepper(this.kind, this.counters);
      stepper.restart();
      entry = { stepper, controller: methods[this.kind].controller() };
      this.steppers.set(this.kind, entry);
      this.used.push(methods[this.kind].name);
    }
    return entry;
  }

  /** Puts the state at a time of the step just tried into `between`. */
  private toBetween: (time: number) => void = () => undefined;

  private leavesAt(time: number): Float64Array {
    this.toBetween(time);
    return this.prepared.evaluate(leavesFunction, time, this.prepared.common.between);
  }

  /** Records the samples of the present step before `time`. */
  private recordBefore(time: number): void {
    const { times, record } = this.problem;
    for (
      let next = times[this.nextSample];
      next !== undefined && next < time;
      next = times[this.nextSample]
    ) {
      this.toBetween(next);
      record(next, this.prepared.common.between);
      this.nextSample++;
    }
  }

  /** Records the samples at the present time. */
  private recordHere(): void {
    const { times, record } = this.problem;
    for (
      let next = times[this.nextSample];
      next !== undefined && next <= this.time;
      next = times[this.nextSample]
    ) {
      record(next, this.prepared.common.state);
      this.nextSample++;
    }
  }

  private firstStep(): number {
    const { prepared, problem, time } = this;
    const { common } = prepared;
    const scale = Float64Array.from(
      problem.absoluteTolerance,
      (tolerance, i) => tolerance + problem.relativeTolerance * Math.abs(this.state[i]!),
    );
    const slopes = prepared.vector(common.next);
    const argument = prepared.vector(common.stage);
    prepared.rightHandSide(time, common.state, common.next);
    const slope = slopes.slice();
    const slopeAt = (h: number): Float64Array => {
      for (let i = 0; i < slope.length; i++) argument[i] = this.state[i]! + h * slope[i]!;
      prepared.rightHandSide(time + h, common.stage, common.next);
      return slopes;
    };
    this.counters.rhs += 2;
    return initialStep(
      this.state,
      slope,
      scale,
      slopeAt,
      methods[this.kind].errorPower,
      problem.until - time,
    );
  }

  private tooSmall(infinite = false): StopReason {
    const { size, component } = this.largest();
    const before = this.sizeAtHalf[0] ?? size;
    if (size > growthFactor * before) return { kind: 'growth', component, value: this.state[component]! };
    return { kind: infinite ? 'not finite' : 'step too small' };
  }

  /** Remembers how large the state was after 1, 2, 4, 8 … steps, of which the last two are kept. */
  private noteSize(): void {
    if ((this.steps & (this.steps - 1)) === 0) {
      const { size } = this.largest();
      this.sizeAtHalf = [this.sizeAtHalf.at(-1) ?? size, size];
    }
  }

  private largest(): { size: number; component: number } {
    let component = 0;
    let size = 0;
    this.state.forEach((value, index) => {
      if (Math.abs(value) <= size) return;
      size = Math.abs(value);
      component = index;
    });
    return { size, component };
  }

  outcome(stop: StopReason | null): Outcome {
    const { steps, rejected, counters, used } = this;
    return { time: this.time, stop, statistics: { ...counters, steps, rejected, methods: used } };
  }
}
