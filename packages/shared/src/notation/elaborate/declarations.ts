import type { ExpressionSyntax, Span } from '../../expression/syntax.ts';
import { walkSyntax } from '../../expression/names.ts';
import type { AssignmentSyntax, LineSyntax, NetworkTree, RowSyntax } from '../ast.ts';
import type { Complaints } from '../complaints.ts';
import { endOfName, normalName } from '../tokens.ts';
import { UnitNames } from './unit-names.ts';

/** What a name without its indices stands for. An output is a `let` of species or time. */
export type NameKind = 'species' | 'constant' | 'output';

interface Declaration {
  kind: NameKind;
  readonly line: number;
}

const kindNames: Readonly<Record<NameKind, string>> = {
  species: 'a species',
  constant: 'a constant',
  output: 'a derived value',
};

/** What each name of a text stands for, found before anything is expanded: names may be used before they are given. */
export class Declarations {
  private readonly names = new Map<string, Declaration>();
  /** Values of lets without indices, for the bounds of families. */
  readonly plainLets = new Map<string, ExpressionSyntax>();
  /** Names that stand in lines with an error: about them nothing is said. */
  readonly inBrokenLines = new Set<string>();
  readonly unitNames: UnitNames;
  private readonly complaints: Complaints;

  constructor(tree: NetworkTree, complaints: Complaints) {
    this.complaints = complaints;
    for (const line of tree.lines) this.declareLine(line);
    this.unitNames = new UnitNames(tree, (word) => this.names.has(word));
    this.findOutputs(tree);
    for (const line of tree.lines) {
      if (line.kind === 'row') this.checkIndices(line);
      this.unitNames.warn(line, complaints);
    }
  }

  kindOf(name: string): NameKind | null {
    return this.names.get(name)?.kind ?? null;
  }

  lineOf(name: string): number {
    return this.names.get(name)?.line ?? 0;
  }

  /** All names of a kind, or all. */
  all(kind?: NameKind): string[] {
    return [...this.names]
      .filter(([, declaration]) => !kind || declaration.kind === kind)
      .map(([name]) => name);
  }

  /** A name in a value that changes in time: a species, an output or `t`; null where all are constants. */
  movingName(value: ExpressionSyntax, indices: ReadonlyMap<string, unknown>): string | null {
    let found: string | null = null;
    walkSyntax(value, (part) => {
      if (found !== null || part.kind !== 'name' || indices.has(part.name)) return;
      const kind = this.kindOf(part.name);
      if (part.name === 't' || kind === 'species' || kind === 'output') found = part.name;
    });
    return found;
  }

  private declareLine(line: LineSyntax): void {
    switch (line.kind) {
      case 'row':
        for (const side of line.sides) {
          for (const { species } of side.terms) this.declare(species.name, 'species', species, line.line);
        }
        for (const item of line.items) {
          if (item.kind === 'constant') this.declare(item.name.name, 'constant', item.name, line.line);
        }
        return;
      case 'rate':
        for (const { target } of line.items) this.declare(target.name, 'species', target, line.line);
        return;
      case 'let':
      case 'volume':
        for (const item of line.items) this.declareLet(item, line.line);
        return;
      case 'broken':
        this.noteBroken(line.source);
        return;
      default:
        return;
    }
  }

  private declareLet(item: AssignmentSyntax, line: number): void {
    const { target, value, family } = item;
    this.declare(target.name, 'constant', target, line);
    if (!target.indices && !family && !this.plainLets.has(target.name))
      this.plainLets.set(target.name, value);
  }

  private declare(name: string, kind: NameKind, at: Span, line: number): void {
    const known = this.names.get(name);
    if (!known) {
      this.names.set(name, { kind, line });
      return;
    }
    if (known.kind === kind) return;
    this.complaints.error(
      at,
      `${name} is ${kindNames[known.kind]} in line ${known.line} and cannot be ${kindNames[kind]} too.`,
      'Species, constants and derived values share one set of names.',
    );
  }

  /** A let that uses a species, `t` or an output is an output itself: followed from its causes to all it reaches. */
  private findOutputs(tree: NetworkTree): void {
    const users = new Map<string, string[]>();
    for (const line of tree.lines) {
      if (line.kind !== 'let') continue;
      for (const { target, value, family } of line.items) {
        const indices = new Set(family?.ranges.map((range) => range.name));
        walkSyntax(value, (part) => {
          const used = part.kind === 'name' && !indices.has(part.name) ? part.name : null;
          if (used !== null) append(users, used, target.name);
          if (part.kind !== 'measured') return;
          const { divisors } = this.unitNames.split(part, noSlots, false);
          for (const { symbol } of divisors) append(users, symbol, target.name);
        });
      }
    }
    if (users.size === 0) return;
    const reached: string[] = ['t', ...this.all('species')];
    const seen = new Set(reached);
    for (let cause = reached.pop(); cause !== undefined; cause = reached.pop()) {
      for (const user of users.get(cause) ?? []) {
        if (seen.has(user)) continue;
        seen.add(user);
        reached.push(user);
        const declaration = this.names.get(user);
        if (declaration?.kind === 'constant') declaration.kind = 'output';
      }
    }
  }

  private checkIndices(row: RowSyntax): void {
    for (const range of row.family?.ranges ?? []) {
      const kind = this.kindOf(range.name);
      if (kind === null) continue;
      const line = this.lineOf(range.name);
      this.complaints.error(
        range,
        `The index ${range.name} is ${kindNames[kind]} in line ${line}.`,
        'Choose another index.',
      );
    }
  }

  private noteBroken(source: string): void {
    for (let at = 0; at < source.length; at += 1) {
      const end = endOfName(source, at, source.length);
      if (end === at) continue;
      this.inBrokenLines.add(normalName(source.slice(at, end)));
      at = end;
    }
  }
}

const noSlots: ReadonlyMap<string, number> = new Map();

function append(lists: Map<string, string[]>, key: string, value: string): void {
  const list = lists.get(key);
  if (list) list.push(value);
  else lists.set(key, [value]);
}
