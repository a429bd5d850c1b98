/**
 * An event: when its condition turns true, some variables and parameters get new values. The condition is made of
 * leaves, real functions of state and time of which only the sign counts.
 */
export interface OdeEvent {
  /** Places of its leaves among all leaves of the system. */
  readonly firstLeaf: number;
  readonly leafCount: number;
  /** Whether the condition holds for the given signs (-1, 0, 1) of its leaves. */
  readonly holds: (signs: Int8Array) => boolean;
  /** Name of the system's function that computes the new values. */
  readonly values: string;
  /** Name of the function that computes how those move with each constant; null without sensitivities. */
  readonly valueSlopes?: string | null;
  /** Where the new values go: a variable or a parameter, by index. */
  readonly targets: readonly { readonly kind: 'variable' | 'parameter'; readonly index: number }[];
}

/** Parts into which a step is cut to see a leaf that changes its sign twice. */
const parts = 8;

/** Events that fire at one time. */
export interface Firing {
  readonly time: number;
  /** The leaves through which they turned true. */
  readonly leaves: readonly number[];
  readonly events: readonly OdeEvent[];
}

/** Follows the signs of all leaves along a course and finds when conditions turn true. */
export class EventWatch {
  private readonly events: readonly OdeEvent[];
  private readonly leavesAt: (time: number) => Float64Array;
  private readonly signs: Int8Array;
  private readonly truth: boolean[];

  /** `leavesAt` gives the leaves at a time of the current step; its array may be reused. */
  constructor(events: readonly OdeEvent[], leaves: number, leavesAt: (time: number) => Float64Array) {
    this.events = events;
    this.leavesAt = leavesAt;
    this.signs = new Int8Array(leaves);
    this.truth = events.map(() => false);
  }

  /** Takes the state at `time` as it is: nothing fires. A leaf that is 0 there takes its sign from just after. */
  begin(time: number): void {
    this.leavesAt(time).forEach((value, leaf) => (this.signs[leaf] = Math.sign(value)));
    this.turnedTrue(this.signs);
  }

  /**
   * After a jump at `time`: the events that the new state turned true, the truth of all being taken over. A leaf that
   * is 0 there keeps the sign it has just after.
   */
  afterJump(time: number): OdeEvent[] {
    this.leavesAt(time).forEach((value, leaf) => {
      if (value !== 0) this.signs[leaf] = Math.sign(value);
    });
    return this.turnedTrue(this.signs);
  }

  /**
   * The first time in (from, to] at which a condition turns true; null if there is none. Signs are then those just
   * after it. With `final` the course ends at `to`, so that nothing turns true just after it.
   */
  advance(from: number, to: number, final: boolean): Firing | null {
    let left = from;
    for (let part = 1; part <= parts; part++) {
      const right = part === parts ? to : from + ((to - from) * part) / parts;
      if (!(right > left)) continue;
      const firing = this.advancePart(left, right, final && part === parts);
      if (firing !== null) return firing;
      left = right;
    }
    return null;
  }

  private advancePart(from: number, to: number, final: boolean): Firing | null {
    const ends = Int8Array.from(this.leavesAt(to), Math.sign);
    if (this.signs.includes(0)) {
      this.signs.forEach((sign, leaf) => (this.signs[leaf] = sign === 0 ? ends[leaf]! : sign));
      this.turnedTrue(this.signs);
    }
    for (let left = from; left < to;) {
      const crossing = this.firstCrossing(left, to, ends);
      if (crossing === null) return null;
      const at = Int8Array.from(this.signs);
      for (const leaf of crossing.leaves) {
        at[leaf] = 0;
        const over = final && crossing.time === to ? ends[leaf]! : -this.signs[leaf]!;
        this.signs[leaf] = over;
      }
      const fired = new Set([...this.turnedTrue(at), ...this.turnedTrue(this.signs)]);
      if (fired.size > 0) {
        const events = this.events.filter((event) => fired.has(event));
        const leaves = crossing.leaves.filter((leaf) =>
          events.some(({ firstLeaf, leafCount }) => leaf >= firstLeaf && leaf < firstLeaf + leafCount),
        );
        return { time: crossing.time, events, leaves };
      }
      left = crossing.time;
    }
    return null;
  }

  /** The earliest change of sign in (left, to] and the leaves that change there. */
  private firstCrossing(
    left: number,
    to: number,
    ends: Int8Array,
  ): { time: number; leaves: number[] } | null {
    let earliest = Infinity;
    let leaves: number[] = [];
    this.signs.forEach((sign, leaf) => {
      if (sign === 0 || ends[leaf] === sign) return;
      const time = this.root(leaf, sign, left, to);
      if (time < earliest) leaves = [];
      if (time <= earliest) leaves.push(leaf);
      earliest = Math.min(earliest, time);
    });
    return leaves.length === 0 ? null : { time: earliest, leaves };
  }

  /**
   * The first representable time at which the leaf no longer has `sign`, by false position safeguarded with bisection
   * (Illinois rule: Dowell, Jarratt 1971).
   */
  private root(leaf: number, sign: number, left: number, right: number): number {
    const value = (time: number): number => this.leavesAt(time)[leaf]! * sign;
    let a = left;
    let b = right;
    let atA = value(a);
    let atB = value(b);
    if (!(atA > 0)) return b;
    for (let turn = 0; turn < 200; turn++) {
      const resolution = 2 ** -52 * Math.max(Math.abs(a), Math.abs(b));
      if (b - a <= resolution) break;
      let c = turn % 3 === 2 ? a + (b - a) / 2 : a + ((b - a) * atA) / (atA - atB);
      if (!(c > a)) c = Math.min(a + resolution, b - resolution / 2);
      if (!(c < b)) c = Math.max(b - resolution, a + resolution / 2);
      if (!(c > a && c < b)) break;
      const atC = value(c);
      if (atC > 0) {
        a = c;
        atA = atC;
        atB /= 2;
      } else {
        b = c;
        atB = Math.min(atC, -Number.MIN_VALUE);
        atA /= 2;
      }
    }
    return b;
  }

  /** Events whose condition holds now and did not before; their truth is taken over. */
  private turnedTrue(signs: Int8Array): OdeEvent[] {
    return this.events.filter((event, index) => {
      const now = this.holds(event, signs);
      const before = this.truth[index]!;
      this.truth[index] = now;
      return now && !before;
    });
  }

  private holds(event: OdeEvent, signs: Int8Array): boolean {
    return event.holds(signs.subarray(event.firstLeaf, event.firstLeaf + event.leafCount));
  }
}
