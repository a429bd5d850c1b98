import type { Network } from '@stillroom/shared/network';
import type { PreparedSystem } from '../ode/index.ts';
import type { RateEquations, SensitivityPlan } from '../rates/index.ts';

/** A course as results hold it, filled time by time. */
export class Course {
  readonly times: number[] = [];
  readonly species: Record<string, number[]> = {};
  readonly derived: Record<string, (number | null)[]> = {};
  readonly sensitivities: Record<string, Record<string, number[]>> | null;
  private readonly prepared: PreparedSystem;
  private readonly speciesLists: number[][];
  private readonly derivedLists: (number | null)[][];
  private readonly sensitivityLists: number[][][];
  /** For each species, its variable, or where its fixed value stands among the parameters. */
  private readonly places: readonly { readonly kind: 'variable' | 'parameter'; readonly index: number }[];
  private readonly variables: number;
  private readonly directions: SensitivityPlan['directions'];

  constructor(
    network: Network,
    equations: RateEquations,
    prepared: PreparedSystem,
    { directions }: SensitivityPlan,
  ) {
    this.prepared = prepared;
    this.variables = equations.variables.length;
    this.places = network.species.map((name) => equations.target(name)!);
    this.speciesLists = network.species.map((name) => (this.species[name] = []));
    this.derivedLists = network.outputs.map(({ name }) => (this.derived[name] = []));
    const sensitivities: Record<string, Record<string, number[]>> = {};
    this.directions = directions;
    this.sensitivityLists = directions.map(({ by: parameter }) => {
      const bySpecies: Record<string, number[]> = {};
      sensitivities[network.constants[parameter]!.name] = bySpecies;
      return network.species.map((name) => (bySpecies[name] = []));
    });
    this.sensitivities = directions.length === 0 ? null : sensitivities;
  }

  /** Appends the state that stands at a slot of memory. */
  record(time: number, state: number): void {
    const vector = this.prepared.vector(state);
    this.times.push(time);
    const { places, speciesLists, sensitivityLists, variables, directions } = this;
    const { parameters } = this.prepared;
    for (let species = 0; species < places.length; species++) {
      const { kind, index } = places[species]!;
      const moves = kind === 'variable';
      speciesLists[species]!.push(moves ? vector[index]! : parameters[index]!);
      for (let k = 0; k < sensitivityLists.length; k++) {
        const rate = moves ? undefined : directions[k]!.rateOf.get(index);
        const fixed = rate === undefined ? 0 : parameters[rate]!;
        sensitivityLists[k]![species]!.push(moves ? vector[index + variables * (1 + k)]! : fixed);
      }
    }
    if (this.derivedLists.length === 0) return;
    const outputs = this.prepared.evaluate('outputs', time, state);
    this.derivedLists.forEach((list, index) => {
      const value = outputs[index]!;
      list.push(Number.isFinite(value) ? value : null);
    });
  }

  /** Appends the last state of a course that stopped, unless its time is there already. */
  recordEnd(time: number): void {
    if ((this.times.at(-1) ?? -1) < time) this.record(time, this.prepared.common.state);
  }
}
