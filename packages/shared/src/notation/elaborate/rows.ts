import type { NetworkRow, ReactionTable } from '../../network/network.ts';
import type { ExpressionSyntax } from '../../expression/syntax.ts';
import type { RowSyntax, SideSyntax, TermSyntax } from '../ast.ts';
import type { Complaints } from '../complaints.ts';
import { Failure } from '../failure.ts';
import { placesOf } from './arrow-places.ts';
import type { ArrowPlace } from './arrow-places.ts';
import { ComplexBuilder } from './complex-builder.ts';
import { compileFamily } from './families.ts';
import { GrowingInts } from './growing.ts';
import type { IndexValues, IntegerFunction, Slots } from './integers.ts';
import type { NameTable } from './name-table.ts';
import { RateReader } from './rates.ts';
import type { ConstantUse, NumberedRow, Rate, RateParts } from './rates.ts';
import { memberScope } from './scope.ts';
import type { Scope } from './scope.ts';
import { compileTarget, noIndices } from './targets.ts';

/** A law that waits until all names are known. */
export interface LawJob {
  readonly syntax: ExpressionSyntax;
  readonly net: boolean;
  readonly scope: Scope;
  readonly reaction: number;
  /** Its number among the arrows of the text, for a constant without name. */
  readonly arrow: number;
  readonly line: number;
}

/** All families of one text together. */
const REACTION_LIMIT = 10_000_000;

const noSlots: Slots = new Map();

interface CompiledTerm {
  readonly term: TermSyntax;
  readonly species: IntegerFunction;
}
type CompiledSide = readonly CompiledTerm[];

/** Writes the reactions of rows and families into tables. */
export class RowWriter {
  readonly complexes = new ComplexBuilder();
  readonly rows: NetworkRow[] = [];
  readonly laws: LawJob[] = [];
  /** Reactions whose rate is told by the net law of their partner. */
  readonly zeroLawReactions: number[] = [];
  private arrows = 0;
  private readonly columns = {
    from: new GrowingInts(),
    to: new GrowingInts(),
    row: new GrowingInts(),
    constant: new GrowingInts(),
    partner: new GrowingInts(),
  };
  private readonly rates: RateReader;
  private readonly species: NameTable;
  private readonly parts: RateParts;
  private readonly complaints: Complaints;

  constructor(species: NameTable, parts: RateParts, complaints: Complaints) {
    this.species = species;
    this.parts = parts;
    this.rates = new RateReader(parts);
    this.complaints = complaints;
  }

  get count(): number {
    return this.columns.from.length;
  }

  get uses(): readonly ConstantUse[] {
    return this.rates.uses;
  }

  /** Whether a species occurs in a row. */
  usesSpecies(species: number): boolean {
    return this.complexes.uses(species);
  }

  /** The species that a reaction uses up, with their coefficients. */
  reactantOf(reaction: number): { species: number; coefficient: number }[] {
    return this.complexes.termsOf(this.columns.from.get(reaction));
  }

  /** The table of reactions with the laws that were resolved meanwhile. */
  toTable(law: Int32Array): ReactionTable {
    const { from, to, row, constant, partner } = this.columns;
    return {
      count: this.count,
      from: from.toArray(),
      to: to.toArray(),
      row: row.toArray(),
      constant: constant.toArray(),
      law,
      partner: partner.toArray(),
    };
  }

  /** Writes a row; failures are complaints. */
  write(row: RowSyntax): void {
    const places = placesOf(row.arrows);
    const firstArrow = this.arrows + 1;
    this.arrows += places.length;
    const before = this.count;
    try {
      const family = compileFamily(row.family, this.parts.integers, places.length);
      this.writeMembers({ row, places, firstArrow, family });
    } catch (thrown) {
      this.complexes.drop();
      this.complaints.failure(thrown);
    }
    const reactions = this.count - before;
    this.rows.push({ line: row.line, note: row.note, reactions, family: row.family !== null });
  }

  private writeMembers(numbered: NumberedRow): void {
    const { row, places, family } = numbered;
    const { rates, lawConstants } = this.rates.ratesOf(numbered);
    const sides = row.family ? row.sides.map((side) => this.compileSide(side, family.slots)) : null;
    const complexes = row.sides.map(() => 0);
    let unchanged = 0;
    family.forEach((values) => {
      for (let s = 0; s < complexes.length; s += 1) {
        complexes[s] = sides
          ? this.complexOf(sides[s] as CompiledSide, values)
          : this.plainComplex(row.sides[s] as SideSyntax);
      }
      for (let p = 0; p < places.length; p += 1) {
        const place = places[p] as ArrowPlace;
        const from = complexes[place.from] as number;
        const to = complexes[place.to] as number;
        if (from === to) unchanged += 1;
        else this.writeReaction(from, to, rates[p] as Rate, numbered, p, values);
      }
      for (const take of lawConstants) take(values);
      if (this.count > REACTION_LIMIT) {
        throw new Failure(row.from, row.to, `The text writes more than ${REACTION_LIMIT} reactions.`);
      }
    });
    if (unchanged > 0) this.complainUnchanged(row, unchanged);
  }

  private writeReaction(
    from: number,
    to: number,
    rate: Rate,
    numbered: NumberedRow,
    p: number,
    values: IndexValues,
  ): void {
    const { columns } = this;
    const reaction = this.count;
    const isBackward = numbered.places[p]?.half === 'backward';
    columns.from.push(from);
    columns.to.push(to);
    columns.row.push(this.rows.length);
    columns.constant.push(rate.kind === 'constant' ? rate.of(values) : -1);
    columns.partner.push(isBackward ? reaction - 1 : -1);
    if (isBackward) columns.partner.set(reaction - 1, reaction);
    if (rate.kind === 'constant') return;
    if (rate.kind === 'zero') {
      this.zeroLawReactions.push(reaction);
      return;
    }
    const { row, firstArrow, family } = numbered;
    const scope = memberScope(family.slots, values);
    const net = rate.kind === 'net';
    this.laws.push({ syntax: rate.value, net, scope, reaction, arrow: firstArrow + p, line: row.line });
  }

  private complainUnchanged(row: RowSyntax, count: number): void {
    const at = { from: row.from, to: row.sides.at(-1)?.to ?? row.to };
    if (row.family) {
      const what =
        count === 1
          ? 'One reaction of this family has equal sides and is'
          : `${count} reactions of this family have equal sides and are`;
      this.complaints.warning(at, `${what} left out.`);
      return;
    }
    const hint = 'Change a side or delete the row.';
    this.complaints.error(at, 'Both sides of this arrow are equal: nothing happens.', hint);
  }

  /** The complex of a side that stands in no family, as most do. */
  private plainComplex(side: SideSyntax): number {
    const { species, complexes } = this;
    for (const term of side.terms) {
      const { name, indices } = term.species;
      const number = indices
        ? compileTarget(species, term.species, noSlots, this.parts.integers)(noIndices)
        : species.intern(species.base(name), noIndices);
      complexes.add(number, term);
    }
    return complexes.finish();
  }

  private compileSide(side: SideSyntax, slots: Slots): CompiledSide {
    const { integers } = this.parts;
    return side.terms.map((term) => ({
      term,
      species: compileTarget(this.species, term.species, slots, integers),
    }));
  }

  private complexOf(side: CompiledSide, values: IndexValues): number {
    for (let i = 0; i < side.length; i += 1) {
      const { term, species } = side[i] as CompiledTerm;
      this.complexes.add(species(values), term);
    }
    return this.complexes.finish();
  }
}
