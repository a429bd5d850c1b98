import type { ExpressionSyntax, NameSyntax, Span } from '../../expression/syntax.ts';
import type { ItemSyntax, RowSyntax, SideSyntax } from '../ast.ts';
import type { Repair } from '../complaint.ts';
import { Failure } from '../failure.ts';
import type { ArrowPlace } from './arrow-places.ts';
import type { Declarations } from './declarations.ts';
import type { Family } from './families.ts';
import type { IndexValues, IntegerFunction, IntegerNames } from './integers.ts';
import { arrowsOfItem, partItems } from './law-items.ts';
import type { LawConstant } from './law-items.ts';
import type { NameTable } from './name-table.ts';
import { memberScope, valueScope } from './scope.ts';
import { compileTarget, noIndices } from './targets.ts';
import type { Values } from './values.ts';

/** What stands for the rate of a directed arrow: a constant for each member, or a law. */
export type Rate =
  | { readonly kind: 'constant'; readonly of: IntegerFunction }
  | { readonly kind: 'law' | 'net'; readonly value: ExpressionSyntax }
  /** The backward half of an arrow whose forward half has a net law. */
  | { readonly kind: 'zero' };

/** That a constant is the rate constant of a reaction. */
export interface ConstantUse {
  readonly constant: number;
  readonly reactant: SideSyntax;
  readonly product: SideSyntax;
  readonly at: Span;
}

export interface RateParts {
  readonly constants: NameTable;
  readonly declarations: Declarations;
  readonly values: Values;
  readonly integers: IntegerNames;
}

/** A row with the number of its first directed arrow among all of the text, from 1. */
export interface NumberedRow {
  readonly row: RowSyntax;
  readonly places: readonly ArrowPlace[];
  readonly firstArrow: number;
  readonly family: Family;
}

/** The rates of a row's directed arrows, and what takes down the constants of its laws for a member. */
export interface RowRates {
  readonly rates: readonly Rate[];
  readonly lawConstants: readonly IntegerFunction[];
}

/** Hands the items of the constants column to the arrows of the row. */
export class RateReader {
  readonly uses: ConstantUse[] = [];
  private readonly parts: RateParts;

  constructor(parts: RateParts) {
    this.parts = parts;
  }

  /** The rate of each directed arrow of a row. Throws Failure where items and arrows do not fit. */
  ratesOf(numbered: NumberedRow): RowRates {
    const { row, places } = numbered;
    if (row.items.length === 0) {
      return { rates: places.map((_, p) => this.unnamed(numbered, p, null)), lawConstants: [] };
    }
    const { ofRates, ofLaws } = partItems(row, places.length);
    const rates: Rate[] = [];
    for (const item of ofRates) {
      if (!places[rates.length]) break;
      rates.push(...this.ratesOfItem(numbered, rates.length, item));
    }
    const given = ofRates.reduce((count, item) => count + arrowsOfItem(item), 0);
    if (given !== places.length) throw this.wrongCount(numbered, ofRates, given);
    return { rates, lawConstants: ofLaws.map((item) => this.lawConstant(numbered, item)) };
  }

  private ratesOfItem(numbered: NumberedRow, p: number, item: ItemSyntax): Rate[] {
    switch (item.kind) {
      case 'net':
        if (numbered.places[p]?.half !== 'forward') {
          throw new Failure(item.from, item.to, 'net = … gives the rate of a whole <=>; this is no <=>.', {
            hint: 'Write law = ….',
          });
        }
        return [{ kind: 'net', value: item.value }, { kind: 'zero' }];
      case 'law':
        return [{ kind: 'law', value: item.value }];
      case 'value':
        return [this.unnamed(numbered, p, item.value)];
      case 'constant':
        return [this.named(numbered, p, item)];
    }
  }

  private named(numbered: NumberedRow, p: number, item: ItemSyntax & { kind: 'constant' }): Rate {
    const { constants, declarations, integers } = this.parts;
    const { name, value } = item;
    if (declarations.kindOf(name.name) === 'output') {
      throw new Failure(item.from, item.to, `${name.name} changes in time and cannot be a rate constant.`, {
        hint: `Write law = ${name.name}*….`,
      });
    }
    const intern = compileTarget(constants, name, numbered.family.slots, integers);
    return {
      kind: 'constant',
      of: this.onceFor(name, intern, (constant, values) => {
        this.take(constant, numbered, p, value, name, values);
      }),
    };
  }

  /** A constant that a law of the row uses: it gets its value here, or is given it elsewhere. */
  private lawConstant(numbered: NumberedRow, { name, value }: LawConstant): IntegerFunction {
    const { constants, declarations, integers } = this.parts;
    if (!value && declarations.kindOf(name.name) === 'output') return () => -1;
    const intern = compileTarget(constants, name, numbered.family.slots, integers);
    return this.onceFor(name, intern, (constant, values) => {
      if (value) this.define(constant, numbered, value, name, values);
    });
  }

  /** Numbers a constant for each member of a family, and takes down each once. */
  private onceFor(
    name: NameSyntax,
    intern: IntegerFunction,
    take: (constant: number, values: IndexValues) => void,
  ): IntegerFunction {
    if (!name.indices) {
      const constant = intern(noIndices);
      take(constant, noIndices);
      return () => constant;
    }
    const taken = new Set<number>();
    return (values) => {
      const constant = intern(values);
      if (!taken.has(constant)) {
        taken.add(constant);
        take(constant, values);
      }
      return constant;
    };
  }

  /** A rate constant without name is called k and the number of its arrow. */
  private unnamed(numbered: NumberedRow, p: number, value: ExpressionSyntax | null): Rate {
    const { constants, declarations } = this.parts;
    const name = `k${numbered.firstArrow + p}`;
    const at = value ?? numbered.places[p]?.arrow ?? numbered.row;
    if (declarations.kindOf(name) !== null) {
      const line = declarations.lineOf(name);
      throw new Failure(
        at.from,
        at.to,
        `This arrow has no name and would be ${name}, which line ${line} uses.`,
        {
          hint: 'Give its constant another name.',
        },
      );
    }
    const constant = constants.intern(constants.base(name), noIndices);
    this.take(constant, numbered, p, value, at, noIndices);
    return { kind: 'constant', of: () => constant };
  }

  /** Notes that a constant is the rate constant of an arrow, and takes down its value where the row gives one. */
  private take(
    constant: number,
    numbered: NumberedRow,
    p: number,
    value: ExpressionSyntax | null,
    at: Span,
    values: IndexValues,
  ): void {
    const { row, places } = numbered;
    const place = places[p];
    const reactant = place && row.sides[place.from];
    const product = place && row.sides[place.to];
    if (reactant && product) this.uses.push({ constant, reactant, product, at });
    if (value) this.define(constant, numbered, value, at, values);
  }

  /** Takes down the value that a row gives a constant. */
  private define(
    constant: number,
    { row, family }: NumberedRow,
    value: ExpressionSyntax,
    at: Span,
    values: IndexValues,
  ): void {
    const moving = this.parts.declarations.movingName(value, family.slots);
    if (moving !== null) {
      throw new Failure(
        value.from,
        value.to,
        `${moving} changes in time and cannot be part of a constant of a row.`,
        {
          hint: 'Write law = … for a rate that is not mass action.',
        },
      );
    }
    const scope = values.length > 0 ? memberScope(family.slots, values, valueScope) : valueScope;
    this.parts.values.define(this.parts.constants.nameOf(constant), { value, scope, at, line: row.line });
  }

  private wrongCount(
    { row, places, firstArrow }: NumberedRow,
    items: readonly ItemSyntax[],
    given: number,
  ): Failure {
    const { itemsSpan } = row;
    const needed = places.length;
    const last = items.at(-1);
    const repairs: Repair[] = [];
    if (given < needed && last) {
      const names = Array.from({ length: needed - given }, (_, i) => this.freshName(firstArrow + given + i));
      repairs.push({
        label: `Add ${names.join(', ')}`,
        from: last.to,
        to: last.to,
        insert: `, ${names.join(', ')}`,
      });
    }
    const kept = items[needed - 1];
    if (
      given > needed &&
      kept &&
      last &&
      items.length === row.items.length &&
      items.every((item) => item.kind !== 'net')
    ) {
      repairs.push({ label: `Keep the first ${needed}`, from: kept.to, to: last.to, insert: '' });
    }
    const takes = needed === 1 ? 'one constant' : `${needed} constants`;
    const are = given === 1 ? 'is' : 'are';
    return new Failure(
      items[0]?.from ?? itemsSpan.from,
      last?.to ?? itemsSpan.to,
      `This row takes ${takes}, ${given} ${are} given.`,
      {
        hint: items.some(({ kind }) => kind === 'law' || kind === 'net')
          ? 'Beside these only constants that its law uses may stand here.'
          : 'One for -> or <-, two for <=> (left to right, then back), or none at all.',
        repairs,
      },
    );
  }

  private freshName(arrow: number): string {
    let name = `k${arrow}`;
    while (this.parts.declarations.kindOf(name) !== null) name += `'`;
    return name;
  }
}
