import { walkSyntax } from '../../expression/names.ts';
import type { ExpressionSyntax, MeasuredSyntax } from '../../expression/syntax.ts';
import { unitOf } from '../../units/unit.ts';
import type { Unit } from '../../units/unit.ts';
import type { LineSyntax, NetworkTree } from '../ast.ts';
import type { Complaints } from '../complaints.ts';
import type { Slots } from './integers.ts';
import { valuesOf } from './line-values.ts';

/** What a unit is once the names among its words are known. */
export interface SplitUnit {
  readonly unit: Unit;
  /** Words after `/` that are names: the value is divided by them. */
  readonly divisors: Unit;
}

/**
 * Tells units from names after `/`. `1/L` is one per litre, or one divided by L where the text has an L: an index is
 * always a name; what a rate constant or start is given in is always a unit; so is what follows a single number in a text
 * that is in units; everywhere else the name goes first.
 */
export class UnitNames {
  private readonly inUnits: boolean;
  private readonly isName: (word: string) => boolean;
  /** Units without a name among their words, each split once. */
  private readonly whole = new WeakMap<Unit, SplitUnit>();

  constructor(tree: NetworkTree, isName: (word: string) => boolean) {
    this.isName = isName;
    this.inUnits = tree.lines.some((line) => this.holdsUnit(line));
  }

  split(syntax: MeasuredSyntax, slots: Slots, unitsFirst: boolean): SplitUnit {
    const isUnit = syntax.of.kind === 'number' && (unitsFirst || this.inUnits);
    if (isUnit && slots.size === 0) {
      let split = this.whole.get(syntax.unit);
      if (split === undefined) {
        split = { unit: syntax.unit, divisors: [] };
        this.whole.set(syntax.unit, split);
      }
      return split;
    }
    const divisors = syntax.unit.filter(
      ({ symbol, power }) => power < 0 && (slots.has(symbol) || (!isUnit && this.isName(symbol))),
    );
    if (divisors.length === 0) return { unit: syntax.unit, divisors };
    return { unit: unitOf(syntax.unit.filter((factor) => !divisors.includes(factor))), divisors };
  }

  /** Warns where a name of the text was taken for a unit in a value that could have used it. */
  warn(line: LineSyntax, complaints: Complaints): void {
    if (!this.inUnits || line.kind === 'start' || line.kind === 'fix' || line.kind === 'volume') return;
    if (line.kind === 'row' && !line.items.some(({ kind }) => kind === 'law')) return;
    const values =
      line.kind === 'row'
        ? line.items.flatMap((item) => (item.kind === 'law' ? [item.value] : []))
        : valuesOf(line);
    for (const value of values) {
      walkSyntax(value, (part) => {
        if (part.kind !== 'measured' || part.of.kind !== 'number') return;
        const name = part.unit.find(({ symbol, power }) => power < 0 && this.isName(symbol))?.symbol;
        if (name === undefined) return;
        const message = `/${name} is read as a unit here, though this text has a ${name}.`;
        complaints.warning(part.unitSpan, message, `To divide by it write ${name}^-1 as a factor.`);
      });
    }
  }

  /** Whether a line has a unit that cannot be anything else. */
  private holdsUnit(line: LineSyntax): boolean {
    if (amountsOf(line).some((value) => value?.kind === 'measured' && value.of.kind === 'number'))
      return true;
    let found = false;
    for (const value of valuesOf(line)) {
      if (found) break;
      walkSyntax(value, (part) => {
        found ||=
          part.kind === 'measured' &&
          part.unit.some(({ symbol, power }) => power > 0 || !this.isName(symbol));
      });
    }
    return found;
  }
}

/** The values of a line that are read with units first: rate constants, starts, fixed values and volumes. */
function amountsOf(line: LineSyntax): readonly (ExpressionSyntax | null)[] {
  if (line.kind === 'row')
    return line.items.filter(({ kind }) => kind !== 'law' && kind !== 'net').map(({ value }) => value);
  return line.kind === 'start' || line.kind === 'fix' || line.kind === 'volume' ? valuesOf(line) : [];
}
