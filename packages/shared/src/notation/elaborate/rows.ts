import type { NetworkRow, ReactionTable } from '../../network/network.ts';
import type { ExpressionSyntax, Span } from '../../expression/syntax.ts';
import type { ArrowSyntax, ItemSyntax, RowSyntax, SideSyntax, TargetSyntax, TermSyntax } from '../ast.ts';
import type { Complaints } from '../complaints.ts';
import type { Repair } from '../complaint.ts';
import { Failure } from '../failure.ts';
import { ComplexBuilder } from './complex-builder.ts';
import type { Declarations } from './declarations.ts';
import { compileFamily } from './families.ts';
import type { Family } from './families.ts';
import { GrowingInts } from './growing.ts';
import { compileInteger } from './integers.ts';
import type { IndexValues, IntegerFunction, IntegerNames, Slots } from './integers.ts';
import type { NameTable } from './name-table.ts';
import { checkedIndex } from './resolver.ts';
import { memberScope } from './scope.ts';
import type { Scope } from './scope.ts';
import type { Values } from './values.ts';

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

/** That a constant is the rate constant of a reaction. */
export interface ConstantUse {
  readonly constant: number;
  readonly reactant: SideSyntax;
  readonly product: SideSyntax;
  readonly at: Span;
}

/** Several texts' worth: families of one text together. */
const REACTION_LIMIT = 10_000_000;

type Sense = 'forward' | 'backward';

/** One directed arrow of a row. */
interface ArrowPlace {
  readonly sense: Sense;
  readonly from: number;
  readonly to: number;
  readonly arrow: ArrowSyntax;
  /** Whether it is half of a `<=>`. */
  readonly paired: boolean;
}

/** What stands for the rate of a directed arrow: a constant for each member, or a law. */
type Rate =
  | { readonly kind: 'constant'; readonly of: IntegerFunction }
  | { readonly kind: 'law' | 'net'; readonly value: ExpressionSyntax }
  | { readonly kind: 'zero' };

/** Writes the reactions of rows and families into tables. */
export class RowWriter {
  readonly complexes = new ComplexBuilder();
  readonly rows: NetworkRow[] = [];
  readonly laws: LawJob[] = [];
  readonly uses: ConstantUse[] = [];
  /** Whether a backward arrow of a net law needs the zero law. */
  zeroLawReactions: number[] = [];
  private arrows = 0;
  private readonly columns = {
    from: new GrowingInts(),
    to: new GrowingInts(),
    row: new GrowingInts(),
    constant: new GrowingInts(),
    partner: new GrowingInts(),
  };
  private readonly species: NameTable;
  private readonly constants: NameTable;
  private readonly declarations: Declarations;
  private readonly values: Values;
  private readonly integers: IntegerNames;
  private readonly complaints: Complaints;

  constructor(parts: {
    species: NameTable;
    constants: NameTable;
    declarations: Declarations;
    values: Values;
    integers: IntegerNames;
    complaints: Complaints;
  }) {
    this.species = parts.species;
    this.constants = parts.constants;
    this.declarations = parts.declarations;
    this.values = parts.values;
    this.integers = parts.integers;
    this.complaints = parts.complaints;
  }

  get count(): number {
    return this.columns.from.length;
  }

  /** Whether a species occurs in a row. */
  usesSpecies(species: number): boolean {
    return this.complexes.uses(species);
  }

  /** The species that a reaction uses up, with their coefficients. */
  reactantOf(reaction: number): { species: number; coefficient: number }[] {
    return this.complexes.termsOf(this.columns.from.get(reaction));
  }

  /** Everything but the laws, which are filled in when they are resolved. */
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
      const family = compileFamily(row.family, this.integers, places.length);
      const rates = this.ratesOf(row, places, firstArrow, family);
      this.writeMembers(row, places, family, rates, firstArrow);
    } catch (thrown) {
      this.complexes.drop();
      this.complaints.failure(thrown);
    }
    const reactions = this.count - before;
    this.rows.push({ line: row.line, note: row.note, reactions, family: row.family !== null });
  }

  private writeMembers(
    row: RowSyntax,
    places: readonly ArrowPlace[],
    family: Family,
    rates: readonly Rate[],
    firstArrow: number,
  ): void {
    const sides = row.sides.map((side) => this.compileSide(side, family.slots));
    const complexes = sides.map(() => 0);
    const rowIndex = this.rows.length;
    let unchanged = 0;
    family.forEach((values) => {
      for (let s = 0; s < sides.length; s += 1)
        complexes[s] = this.complexOf(sides[s] as CompiledSide, values);
      for (let p = 0; p < places.length; p += 1) {
        const place = places[p] as ArrowPlace;
        const from = complexes[place.from] as number;
        const to = complexes[place.to] as number;
        if (from === to) {
          unchanged += 1;
          continue;
        }
        const reaction = this.count;
        const rate = rates[p] as Rate;
        this.columns.from.push(from);
        this.columns.to.push(to);
        this.columns.row.push(rowIndex);
        this.columns.constant.push(rate.kind === 'constant' ? rate.of(values) : -1);
        const backward = place.paired && place.sense === 'backward';
        this.columns.partner.push(backward ? reaction - 1 : -1);
        if (backward) this.columns.partner.set(reaction - 1, reaction);
        if (rate.kind !== 'constant') this.noteLaw(rate, row, family, values, reaction, firstArrow + p);
      }
      if (this.count > REACTION_LIMIT) {
        throw new Failure(row.from, row.to, `The text writes more than ${REACTION_LIMIT} reactions.`);
      }
    });
    if (unchanged > 0) this.complainUnchanged(row, unchanged);
  }

  private noteLaw(
    rate: Rate,
    row: RowSyntax,
    family: Family,
    values: IndexValues,
    reaction: number,
    arrow: number,
  ): void {
    if (rate.kind === 'zero') this.zeroLawReactions.push(reaction);
    if (rate.kind !== 'law' && rate.kind !== 'net') return;
    const scope = memberScope(family.slots, values);
    this.laws.push({ syntax: rate.value, net: rate.kind === 'net', scope, reaction, arrow, line: row.line });
  }

  private complainUnchanged(row: RowSyntax, count: number): void {
    const at = { from: row.from, to: row.arrows.at(-1)?.to ?? row.to };
    if (row.family) {
      const times = count === 1 ? 'One reaction' : `${count} reactions`;
      this.complaints.warning(
        at,
        `${times} of this family would have equal sides and ${count === 1 ? 'is' : 'are'} left out.`,
      );
      return;
    }
    this.complaints.error(
      at,
      'Both sides of this arrow are equal: nothing happens.',
      'Change a side or delete the row.',
    );
  }

  private compileSide(side: SideSyntax, slots: Slots): CompiledSide {
    return side.terms.map((term) => ({ term, species: this.compileName(this.species, term.species, slots) }));
  }

  /** A function that numbers the species or constant of each member. */
  private compileName(table: NameTable, target: TargetSyntax, slots: Slots): IntegerFunction {
    const base = table.base(target.name);
    if (!target.indices) return () => table.intern(base, noIndices);
    const indices = target.indices.map((index) => compileInteger(index, slots, this.integers));
    const scratch = indices.map(() => 0);
    return (values) => {
      for (let i = 0; i < indices.length; i += 1) {
        const value = (indices[i] as IntegerFunction)(values);
        scratch[i] =
          (value | 0) === value ? value : checkedIndex(value, target.indices?.[i] as ExpressionSyntax);
      }
      return table.intern(base, scratch);
    };
  }

  private complexOf(side: CompiledSide, values: IndexValues): number {
    for (let i = 0; i < side.length; i += 1) {
      const { term, species } = side[i] as CompiledTerm;
      this.complexes.add(species(values), term);
    }
    return this.complexes.finish();
  }

  /** The rate of each directed arrow of a row, from its constants column. */
  private ratesOf(row: RowSyntax, places: readonly ArrowPlace[], firstArrow: number, family: Family): Rate[] {
    const { items } = row;
    const rates: Rate[] = [];
    if (items.length === 0) {
      return places.map((place, p) => this.unnamed(row, place, firstArrow + p, null, family));
    }
    for (const item of items) {
      const place = places[rates.length];
      if (!place) break;
      if (item.kind === 'net') {
        if (!place.paired || place.sense !== 'forward') {
          throw new Failure(item.from, item.to, 'net = … gives the rate of a whole <=>; this is no <=>.', {
            hint: 'Write law = ….',
          });
        }
        rates.push({ kind: 'net', value: item.value }, { kind: 'zero' });
      } else if (item.kind === 'law') rates.push({ kind: 'law', value: item.value });
      else rates.push(this.constantRate(row, place, firstArrow + rates.length, item, family));
    }
    const given = items.reduce((count, item) => count + (item.kind === 'net' ? 2 : 1), 0);
    if (given !== places.length) throw this.wrongCount(row, places.length, given, firstArrow);
    return rates;
  }

  private wrongCount(row: RowSyntax, needed: number, given: number, firstArrow: number): Failure {
    const { items, itemsSpan } = row;
    const arrows = needed === 1 ? 'one constant' : `${needed} constants`;
    const repairs: Repair[] = [];
    const last = items.at(-1);
    if (given < needed && last) {
      const added = Array.from(
        { length: needed - given },
        (_, i) => `, ${this.freshName(firstArrow + given + i)}`,
      ).join('');
      repairs.push({ label: `Add ${added.slice(2)}`, from: last.to, to: last.to, insert: added });
    }
    const cut = items[needed];
    const kept = items[needed - 1];
    if (given > needed && cut && kept && last && items.every((item) => item.kind !== 'net')) {
      repairs.push({ label: `Keep the first ${needed}`, from: kept.to, to: last.to, insert: '' });
    }
    const from = items[0]?.from ?? itemsSpan.from;
    return new Failure(
      from,
      last?.to ?? itemsSpan.to,
      `This row takes ${arrows}, ${given} ${given === 1 ? 'is' : 'are'} given.`,
      {
        hint: 'One for -> or <-, two for <=> (left to right, then back), or none at all.',
        repairs,
      },
    );
  }

  private freshName(arrow: number): string {
    const free = (name: string) => this.declarations.kindOf(name) === null;
    return [`k${arrow}`, `k${arrow}'`, `kk${arrow}`].find(free) ?? `k_${arrow}`;
  }

  private constantRate(
    row: RowSyntax,
    place: ArrowPlace,
    arrow: number,
    item: ItemSyntax & { kind: 'constant' | 'value' },
    family: Family,
  ): Rate {
    if (item.kind === 'value') return this.unnamed(row, place, arrow, item.value, family);
    const { name, value } = item;
    if (this.declarations.kindOf(name.name) === 'output') {
      throw new Failure(item.from, item.to, `${name.name} changes in time and cannot be a rate constant.`, {
        hint: `Write law = ${name.name}*….`,
      });
    }
    const intern = this.compileName(this.constants, name, family.slots);
    if (!name.indices) {
      const constant = intern(noIndices);
      this.use(constant, row, place, name);
      if (value) this.define(constant, value, row, name, family, noIndices);
      return { kind: 'constant', of: () => constant };
    }
    const used = new Set<number>();
    return {
      kind: 'constant',
      of: (values) => {
        const constant = intern(values);
        if (!used.has(constant)) {
          used.add(constant);
          this.use(constant, row, place, name);
          if (value) this.define(constant, value, row, name, family, values);
        }
        return constant;
      },
    };
  }

  /** A rate constant without name is called k and the number of its arrow. */
  private unnamed(
    row: RowSyntax,
    place: ArrowPlace,
    arrow: number,
    value: ExpressionSyntax | null,
    family: Family,
  ): Rate {
    const name = `k${arrow}`;
    const at = value ?? place.arrow;
    const kind = this.declarations.kindOf(name);
    if (kind !== null) {
      throw new Failure(
        at.from,
        at.to,
        `This arrow has no name and would be ${name}, which line ${this.declarations.lineOf(name)} uses.`,
        {
          hint: 'Give its constant another name.',
        },
      );
    }
    const constant = this.constants.intern(this.constants.base(name), noIndices);
    this.use(constant, row, place, at);
    if (value) this.define(constant, value, row, value, family, noIndices);
    return { kind: 'constant', of: () => constant };
  }

  private define(
    constant: number,
    value: ExpressionSyntax,
    row: RowSyntax,
    at: Span,
    family: Family,
    values: IndexValues,
  ): void {
    const scope = values.length > 0 ? memberScope(family.slots, values) : memberScope(noSlots, noIndices);
    const name = this.constants.nameOf(constant);
    this.values.define(name, { value, scope: { ...scope, unitsFirst: true }, at, line: row.line });
  }

  private use(constant: number, row: RowSyntax, place: ArrowPlace, at: Span): void {
    const reactant = row.sides[place.from];
    const product = row.sides[place.to];
    if (!reactant || !product) return;
    this.uses.push({ constant, reactant, product, at });
  }
}

const noIndices: readonly number[] = [];
const noSlots: Slots = new Map();

interface CompiledTerm {
  readonly term: TermSyntax;
  readonly species: IntegerFunction;
}
type CompiledSide = readonly CompiledTerm[];

/** The directed arrows of a row, left to right, of a `<=>` the one to the right first. */
function placesOf(arrows: readonly ArrowSyntax[]): ArrowPlace[] {
  return arrows.flatMap((arrow, i): ArrowPlace[] => {
    const forward: ArrowPlace = { sense: 'forward', from: i, to: i + 1, arrow, paired: arrow.sign === '<=>' };
    const backward: ArrowPlace = { ...forward, sense: 'backward', from: i + 1, to: i };
    if (arrow.sign === '->') return [forward];
    return arrow.sign === '<-' ? [backward] : [forward, backward];
  });
}
