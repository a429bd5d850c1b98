import type { Expression } from '../../expression/expression.ts';
import type { Compartment, Network, NetworkEvent, StartQuantity } from '../../network/network.ts';
import type { AssignmentSyntax, EventSyntax, LineSyntax, PlaceSyntax } from '../ast.ts';
import { nameOfTarget } from '../parse-names.ts';
import { Failure } from '../failure.ts';
import { readCompartments } from './compartments.ts';
import { forEachTarget } from './stage.ts';
import type { Elaboration, OutputJob } from './stage.ts';
import { refuseUnknownSpecies } from './unknown-species.ts';
import { outermost } from './scope.ts';
import type { Scope } from './scope.ts';
import type { AmountUse } from './unit-check.ts';
import { checkWeight } from './weights.ts';

type Parts = Pick<
  Network,
  'start' | 'fixed' | 'outputs' | 'weights' | 'events' | 'rateRules' | 'compartments'
>;

/** What the statements of a text say, and the values among them that must be amounts. */
export function elaborateStatements(
  stage: Elaboration,
  outputJobs: readonly OutputJob[],
): { parts: Parts; amounts: AmountUse[] } {
  const reader = new StatementReader(stage);
  const outputs = outputJobs.flatMap(({ name, item, scope }) => {
    const expression = reader.resolve(item, scope);
    return expression ? [{ name, expression }] : [];
  });
  const places: PlaceSyntax[] = [];
  for (const line of stage.tree.lines) {
    if (line.kind === 'in') places.push(line);
    else reader.read(line);
  }
  const { start, fixed, weights, events, rateRules, amounts } = reader;
  const compartments: Compartment[] = readCompartments(stage, places);
  return { parts: { start, fixed, outputs, weights, events, rateRules, compartments }, amounts };
}

class StatementReader {
  readonly start = new Map<number, StartQuantity>();
  readonly fixed = new Map<number, StartQuantity>();
  readonly weights = new Map<number, Expression>();
  readonly rateRules = new Map<number, Expression>();
  readonly events: NetworkEvent[] = [];
  readonly amounts: AmountUse[] = [];
  private readonly failed = new Set<AssignmentSyntax>();
  private readonly stage: Elaboration;

  constructor(stage: Elaboration) {
    this.stage = stage;
  }

  read(line: LineSyntax): void {
    switch (line.kind) {
      case 'start':
      case 'fix':
        this.readAmounts(line.kind, line.items);
        return;
      case 'weight':
        this.forEachSpecies(line.items, (species, item, scope) => {
          const expression = this.resolve(item, { ...scope, count: true });
          if (!expression || this.taken(this.weights, species, item, 'weight')) return;
          this.weights.set(species, expression);
          checkWeight(this.stage, this.stage.species.nameOf(species), expression, item);
        });
        return;
      case 'rate':
        this.readRates(line.items);
        return;
      case 'event':
        this.readEvent(line);
        return;
      default:
        return;
    }
  }

  /** The value of an item; null where it fails, which is told once also where the item is a family. */
  resolve(item: AssignmentSyntax, scope: Scope): Expression | null {
    if (this.failed.has(item)) return null;
    try {
      return this.stage.resolver.resolve(item.value, scope);
    } catch (thrown) {
      this.stage.complaints.failure(thrown);
      this.failed.add(item);
      return null;
    }
  }

  private readAmounts(kind: 'start' | 'fix', items: readonly AssignmentSyntax[]): void {
    const own = kind === 'start' ? this.start : this.fixed;
    // A family whose value is one decimal reads it once.
    let last: { item: AssignmentSyntax; quantity: StartQuantity } | null = null;
    this.forEachSpecies(items, (species, item, outer) => {
      if (
        this.taken(this.start, species, item, 'start') ||
        this.taken(this.fixed, species, item, 'fixed value')
      )
        return;
      const scope: Scope = { ...outer, unitsFirst: true };
      let quantity = last?.item === item ? last.quantity : null;
      if (!quantity) {
        this.amounts.push({ species: this.stage.species.nameOf(species), value: item.value, scope });
        quantity = this.stage.values.derivedQuantity(item.value, scope);
        if (item.value.kind === 'number' || item.value.kind === 'measured') {
          last = item.value.kind === 'number' || item.value.of.kind === 'number' ? { item, quantity } : null;
        }
      }
      if (quantity.value < 0)
        throw new Failure(item.value.from, item.value.to, 'An amount cannot be negative.');
      own.set(species, quantity);
    });
  }

  private readRates(items: readonly AssignmentSyntax[]): void {
    const { rows, species: names, complaints } = this.stage;
    this.forEachSpecies(items, (species, item, scope) => {
      if (rows.usesSpecies(species)) {
        const name = names.nameOf(species);
        complaints.error(
          item.target,
          `${name} occurs in a row and cannot have a rate of its own.`,
          'Delete the rate or the rows.',
        );
        return;
      }
      const expression = this.resolve(item, scope);
      if (expression && !this.taken(this.rateRules, species, item, 'rate'))
        this.rateRules.set(species, expression);
    });
  }

  private readEvent(line: EventSyntax): void {
    const { resolver, complaints } = this.stage;
    try {
      const when = resolver.resolve(line.when, outermost);
      const set: { name: string; value: Expression }[] = [];
      forEachTarget(this.stage, { items: line.set }, (_base, _indices, item, member) => {
        const target = resolver.resolve(nameOfTarget(item.target), member);
        const isOutput = this.stage.declarations.kindOf(item.target.name) === 'output';
        if (target.kind !== 'name' || isOutput) {
          throw new Failure(
            item.target.from,
            item.target.to,
            `An event sets species and constants; ${item.target.name} is neither.`,
          );
        }
        const value = this.resolve(item, member);
        if (value) set.push({ name: target.name, value });
      });
      this.events.push({ line: line.line, when, set });
    } catch (thrown) {
      complaints.failure(thrown);
    }
  }

  /** Whether a species has one of these already, which is said. */
  private taken(
    known: ReadonlyMap<number, unknown>,
    species: number,
    item: AssignmentSyntax,
    what: string,
  ): boolean {
    if (!known.has(species)) return false;
    const name = this.stage.species.nameOf(species);
    this.stage.complaints.error(item.target, `${name} already has a ${what}.`, 'Each species gets it once.');
    return true;
  }

  private forEachSpecies(
    items: readonly AssignmentSyntax[],
    visit: (species: number, item: AssignmentSyntax, scope: Scope) => void,
  ): void {
    forEachTarget(this.stage, { items }, (base, indices, item, scope) => {
      const species = this.stage.species.find(base, indices);
      if (species < 0) refuseUnknownSpecies(this.stage, item, indices);
      else visit(species, item, scope);
    });
  }
}
