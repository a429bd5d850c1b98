import { content } from '../exact/index.ts';

/** An extreme ray: its coordinates that are not 0 (positive integers, together primitive), indices ascending. */
export type Ray = ReadonlyMap<number, bigint>;

/** A linear inequality Σ coefficient · coordinate ≥ 0, by its coefficients that are not 0. */
export type Inequality = readonly (readonly [coordinate: number, coefficient: bigint])[];

/** Rays kept at one time, and elementary steps, before the enumeration gives up. Both are counts, so results repeat. */
export interface RayLimits {
  readonly rays: number;
  readonly steps: number;
}

/**
 * Extreme rays of { c ≥ 0 : every inequality holds }, by the double description method (Motzkin, Raiffa, Thompson,
 * Thrall 1953) with the combinatorial adjacency test (Fukuda, Prodon 1996), on sparse rays: starting from the orthant,
 * each inequality keeps the rays on its side and joins each adjacent pair that it separates. `rays` is null beyond the limits.
 */
export function extremeRays(
  dimension: number,
  inequalities: readonly Inequality[],
  limits: RayLimits,
): { readonly rays: Ray[] | null; readonly steps: number } {
  const cone = new Cone(dimension, limits);
  const open = inequalities.filter((inequality) => inequality.some(([, coefficient]) => coefficient < 0n));
  open.sort((a, b) => a.length - b.length);
  while (open.length > 0) {
    const next = cone.cheapest(open);
    if (!cone.cut(open[next]!)) return { rays: null, steps: cone.steps };
    open.splice(next, 1);
  }
  return { rays: cone.rays(), steps: cone.steps };
}

interface WorkingRay {
  readonly coordinates: ReadonlyMap<number, bigint>;
  /** Constraints (coordinates, then inequalities by number) at which the ray is not 0, ascending. */
  readonly support: number[];
}

/** Inequalities among the first ones that are weighed against each other at each step. */
const CHOICES = 24;

class Cone {
  readonly #dimension: number;
  readonly #limits: RayLimits;
  readonly #rays = new Set<WorkingRay>();
  readonly #touching = new Map<number, Set<WorkingRay>>();
  readonly #byFirst = new Map<number, Set<WorkingRay>>();
  readonly #mark: number[] = [];
  #round = 0;
  #constraints: number;
  #steps = 0;

  constructor(dimension: number, limits: RayLimits) {
    this.#dimension = dimension;
    this.#limits = limits;
    this.#constraints = dimension;
    for (let j = 0; j < dimension; j++) this.#insert({ coordinates: new Map([[j, 1n]]), support: [j] });
  }

  get steps(): number {
    return this.#steps;
  }

  rays(): Ray[] {
    return [...this.#rays].map((ray) => new Map([...ray.coordinates].sort(([a], [b]) => a - b)));
  }

  /** Index of the inequality that separates the fewest pairs, among the first few. */
  cheapest(open: readonly Inequality[]): number {
    let chosen = 0;
    let least = Infinity;
    for (let i = 0; i < Math.min(open.length, CHOICES) && least > 0; i++) {
      const { positive, negative } = this.#sides(open[i]!);
      const pairs = positive.length * negative.length;
      if (pairs < least) {
        least = pairs;
        chosen = i;
      }
    }
    return chosen;
  }

  /** Intersects with a half space; false beyond the limits. */
  cut(inequality: Inequality): boolean {
    const { positive, negative } = this.#sides(inequality);
    const constraint = this.#constraints++;
    const joined: WorkingRay[] = [];
    for (const [up, above] of positive) {
      for (const [down, below] of negative) {
        if (!this.#adjacent(up, down)) continue;
        joined.push(combine(up, -below, down, above));
        if (joined.length + this.#rays.size > this.#limits.rays) return false;
      }
      if (this.#steps > this.#limits.steps) return false;
    }
    for (const [ray] of negative) this.#remove(ray);
    for (const [ray] of positive) ray.support.push(constraint);
    for (const ray of joined) this.#insert(ray);
    return this.#steps <= this.#limits.steps;
  }

  #sides(inequality: Inequality): { positive: [WorkingRay, bigint][]; negative: [WorkingRay, bigint][] } {
    const values = new Map<WorkingRay, bigint>();
    for (const [coordinate, coefficient] of inequality) {
      for (const ray of this.#touching.get(coordinate) ?? []) {
        this.#steps++;
        values.set(ray, (values.get(ray) ?? 0n) + coefficient * ray.coordinates.get(coordinate)!);
      }
    }
    const entries = [...values];
    return {
      positive: entries.filter(([, value]) => value > 0n),
      negative: entries.filter(([, value]) => value < 0n),
    };
  }

  /** Two rays span a face of dimension 2: no third ray vanishes wherever both vanish. */
  #adjacent(a: WorkingRay, b: WorkingRay): boolean {
    this.#round++;
    let union = 0;
    for (const ray of [a, b]) {
      for (const constraint of ray.support) {
        if (this.#mark[constraint] !== this.#round) union++;
        this.#mark[constraint] = this.#round;
      }
    }
    this.#steps += union;
    if (this.#constraints - 1 - union < this.#dimension - 2) return false;
    for (const ray of [a, b]) {
      for (const constraint of ray.support) {
        for (const third of this.#byFirst.get(constraint) ?? []) {
          if (third !== a && third !== b && this.#inside(third)) return false;
        }
      }
    }
    return true;
  }

  #inside(ray: WorkingRay): boolean {
    for (const constraint of ray.support) {
      this.#steps++;
      if (this.#mark[constraint] !== this.#round) return false;
    }
    return true;
  }

  #insert(ray: WorkingRay): void {
    this.#rays.add(ray);
    addTo(this.#byFirst, ray.support[0]!, ray);
    for (const coordinate of ray.coordinates.keys()) addTo(this.#touching, coordinate, ray);
  }

  #remove(ray: WorkingRay): void {
    this.#rays.delete(ray);
    this.#byFirst.get(ray.support[0]!)?.delete(ray);
    for (const coordinate of ray.coordinates.keys()) this.#touching.get(coordinate)?.delete(ray);
  }
}

function addTo(index: Map<number, Set<WorkingRay>>, key: number, ray: WorkingRay): void {
  const known = index.get(key);
  if (known) known.add(ray);
  else index.set(key, new Set([ray]));
}

/** The primitive ray on a·up + b·down, a and b positive. */
function combine(up: WorkingRay, a: bigint, down: WorkingRay, b: bigint): WorkingRay {
  const sum = new Map<number, bigint>();
  for (const [coordinate, value] of up.coordinates) sum.set(coordinate, a * value);
  for (const [coordinate, value] of down.coordinates) {
    sum.set(coordinate, (sum.get(coordinate) ?? 0n) + b * value);
  }
  const common = content([...sum.values()]);
  if (common > 1n) for (const [coordinate, value] of sum) sum.set(coordinate, value / common);
  const support = [...new Set([...up.support, ...down.support])].sort((x, y) => x - y);
  return { coordinates: sum, support };
}
