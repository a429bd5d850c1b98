import type { Network } from '@stillroom/shared/network';
import { parameterSlot, timeSlot } from '../ode/problem.ts';
import { type Graph, type Node, spaces } from '../program/index.ts';
import { RateError } from './error.ts';
import { expressionNode } from './expression.ts';
import { list, type Values } from './values.ts';

/** Where a named number stands that an event may set: a species that moves, or a constant or fixed species. */
export interface Target {
  readonly kind: 'variable' | 'parameter';
  readonly index: number;
}

/** Names of the network as nodes, and which constants without a value were asked for. */
export class NameTable {
  readonly variables: number[] = [];
  readonly variableOf: Int32Array;
  readonly parameterValues: Float64Array;
  private readonly places = new Map<string, () => Node>();
  private readonly missing = new Set<number>();
  private readonly fixedParameter = new Map<number, number>();
  private numbered: { species: Map<string, number>; constants: Map<string, number> } | null = null;

  private readonly graph: Graph;
  private readonly network: Network;
  private readonly values: Values;

  constructor(graph: Graph, network: Network, values: Values) {
    this.graph = graph;
    this.network = network;
    this.values = values;
    this.variableOf = new Int32Array(network.species.length).fill(-1);
    const constants = network.constants.length;
    this.parameterValues = new Float64Array(constants + network.fixed.size);
    values.constants.forEach((value, index) => (this.parameterValues[index] = value ?? 0));
    network.species.forEach((name, species) => {
      if (network.fixed.has(species)) {
        const index = constants + this.fixedParameter.size;
        this.fixedParameter.set(species, index);
        this.parameterValues[index] = values.start[species]!;
      } else {
        this.variableOf[species] = this.variables.push(species) - 1;
      }
      this.places.set(name, () => this.species(species));
    });
    network.constants.forEach(({ name }, index) => this.places.set(name, () => this.constant(index)));
    for (const { name, expression } of network.outputs) {
      this.places.set(name, () => expressionNode(graph, expression, (inner) => this.resolve(inner)));
    }
    this.places.set('t', () => graph.load(timeSlot));
  }

  resolve(name: string): Node | null {
    return this.places.get(name)?.() ?? null;
  }

  target(name: string): Target | null {
    this.numbered ??= {
      species: new Map(this.network.species.map((entry, index) => [entry, index])),
      constants: new Map(this.network.constants.map((entry, index) => [entry.name, index])),
    };
    const constant = this.numbered.constants.get(name);
    if (constant !== undefined) return { kind: 'parameter', index: constant };
    const species = this.numbered.species.get(name);
    if (species === undefined) return null;
    const variable = this.variableOf[species]!;
    if (variable >= 0) return { kind: 'variable', index: variable };
    return { kind: 'parameter', index: this.fixedParameter.get(species)! };
  }

  /** The parameter of a species that is held constant. */
  parameterOfFixed(species: number): number {
    return this.fixedParameter.get(species)!;
  }

  species(species: number): Node {
    const parameter = this.fixedParameter.get(species);
    if (parameter !== undefined) return this.graph.load(parameterSlot(parameter));
    return this.graph.load(this.variableOf[species]!, spaces.first);
  }

  constant(index: number): Node {
    if (this.values.constants[index] === null) this.missing.add(index);
    return this.graph.load(parameterSlot(index));
  }

  requireValues(): void {
    if (this.missing.size === 0) return;
    const names = [...this.missing].sort((a, b) => a - b).map((index) => this.network.constants[index]!.name);
    throw new RateError(
      `${list(names)} ${names.length === 1 ? 'has' : 'have'} no value.`,
      `Write one in the network (${names[0]} = …) or under "constants" of this cell.`,
    );
  }
}
