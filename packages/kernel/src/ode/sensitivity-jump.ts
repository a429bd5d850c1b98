import type { OdeEvent } from './events.ts';
import type { StopReason } from './outcome.ts';
import type { PreparedSystem } from './prepared-system.ts';

/** The name under which a system offers, for each leaf, its slope along the course and its slope by each constant. */
export const leafSlopesFunction = 'event leaf slopes';

/** Where sensitivities stand: by constant k, after `variables` components of the course itself, as many each. */
export interface SensitivityPlaces {
  readonly variables: number;
  readonly directions: readonly {
    /** The parameter that holds ∂q/∂p_k, by the parameter q. */
    readonly rateOf: ReadonlyMap<number, number>;
    /** The parameter that holds how the time of the present event moves with p_k. */
    readonly timeShift: number;
  }[];
}

/** Two conditions that meet at one time must agree on its shift to this, relatively. */
const agreement = 1e-6;

/**
 * Takes forward sensitivities through events. The time τ of an event, a root of g(x, q, t), moves with a constant p by
 * τ' = −(∂g/∂x s + ∂g/∂q q') / (∂g/∂x f + ∂g/∂t); at the moving time the state moves by S = s + f τ'; every event x := h takes
 * S to ∂h/∂x S + ∂h/∂q q' + ∂h/∂t τ', and afterwards s = S − f τ' with the new f (Rozenvasser 1967, Automation and Remote
 * Control 28, 52–56; Galán, Feehery, Barton 1999, Applied Numerical Mathematics 31, 17–47).
 */
export class SensitivityJump {
  private readonly prepared: PreparedSystem;
  private readonly places: SensitivityPlaces;
  private readonly state: Float64Array;
  private readonly shifts: Float64Array;

  constructor(prepared: PreparedSystem, places: SensitivityPlaces) {
    this.prepared = prepared;
    this.places = places;
    this.state = prepared.vector(prepared.common.state);
    this.shifts = new Float64Array(places.directions.length);
  }

  /** Before the first event at a time, which came through `leaves`. */
  begin(time: number, leaves: readonly number[]): StopReason | null {
    const { prepared, places, shifts } = this;
    const stride = 1 + shifts.length;
    const slopes = prepared.evaluate(leafSlopesFunction, time, prepared.common.state);
    for (let k = 0; k < shifts.length; k++) {
      const found = leaves.map((leaf) => {
        const by = slopes[leaf * stride + 1 + k]!;
        const course = slopes[leaf * stride]!;
        return by === 0 && course !== 0 ? 0 : -by / course;
      });
      const shift = found[0] ?? NaN;
      const tolerance = agreement * Math.abs(shift);
      if (!Number.isFinite(shift) || found.some((other) => !(Math.abs(other - shift) <= tolerance)))
        return { kind: 'sensitivities end' };
      shifts[k] = shift;
      prepared.setParameter(places.directions[k]!.timeShift, shift);
    }
    this.addFlow(time, 1);
    return null;
  }

  /** How what an event sets moves with each constant, before it is set; by constant, then by target. */
  slopes(event: OdeEvent, time: number): Float64Array {
    if (typeof event.valueSlopes !== 'string') return new Float64Array(0);
    return this.prepared.evaluate(event.valueSlopes, time, this.prepared.common.state).slice();
  }

  /** Puts those slopes in their places. */
  apply({ targets }: OdeEvent, slopes: Float64Array): void {
    const { variables, directions } = this.places;
    directions.forEach(({ rateOf }, k) => {
      targets.forEach(({ kind, index }, n) => {
        const slope = slopes[k * targets.length + n]!;
        if (kind === 'variable') this.state[variables * (1 + k) + index] = slope;
        else this.prepared.setParameter(rateOf.get(index)!, slope);
      });
    });
  }

  /** After the last event at a time. */
  end(time: number): void {
    this.addFlow(time, -1);
  }

  /** s += sign · f · τ' for every constant. */
  private addFlow(time: number, sign: number): void {
    const { prepared, places, shifts, state } = this;
    const { common } = prepared;
    prepared.rightHandSide(time, common.state, common.next);
    const flow = prepared.vector(common.next);
    for (let k = 0; k < shifts.length; k++) {
      const first = places.variables * (1 + k);
      for (let i = 0; i < places.variables; i++) state[first + i]! += sign * flow[i]! * shifts[k]!;
    }
  }
}
