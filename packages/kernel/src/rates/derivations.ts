import type { Expression } from '@stillroom/shared/expression';
import { freeNames } from '@stillroom/shared/expression';
import type { Constant } from '@stillroom/shared/network';

/** How constants follow from others (`let b = 2*a`). Those in `detached` have a value of their own instead. */
export class Derivations {
  /** By index of the constant. */
  private readonly expressions: readonly (Expression | null)[];
  /** Derived constants and the indices of those that each draws on, sources first. */
  private readonly order: readonly { readonly constant: number; readonly sources: readonly number[] }[];
  private readonly constants: readonly Constant[];

  constructor(constants: readonly Constant[], detached: ReadonlySet<number> = new Set()) {
    this.constants = constants;
    this.expressions = constants.map(({ expression }, index) =>
      expression === undefined || detached.has(index) ? null : expression,
    );
    this.order = this.expressions.some((expression) => expression !== null) ? this.sorted() : [];
  }

  /** The same with further constants detached. */
  without(detached: ReadonlySet<number>): Derivations {
    const all = new Set(detached);
    this.expressions.forEach((expression, index) => {
      if (expression === null) all.add(index);
    });
    return new Derivations(this.constants, all);
  }

  /** The expression of a derived constant. */
  expression(constant: number): Expression | null {
    return this.expressions[constant] ?? null;
  }

  /** Derived constants that follow any of `seeds`, directly or through others, each after those it draws on. */
  followers(seeds: Iterable<number>): number[] {
    const moved = new Set(seeds);
    const found: number[] = [];
    for (const { constant, sources } of this.order) {
      if (!sources.some((source) => moved.has(source))) continue;
      moved.add(constant);
      found.push(constant);
    }
    return found;
  }

  /** Kahn's order; the notation refuses circles. */
  private sorted(): { constant: number; sources: number[] }[] {
    const places = new Map(this.constants.map(({ name }, index) => [name, index]));
    const users = new Map<number, { constant: number; sources: number[]; open: number }[]>();
    const ready: { constant: number; sources: number[]; open: number }[] = [];
    this.expressions.forEach((expression, constant) => {
      if (expression === null) return;
      const sources = freeNames(expression).flatMap((name) => places.get(name) ?? []);
      const derived = sources.filter((source) => this.expressions[source] !== null);
      const entry = { constant, sources, open: derived.length };
      for (const source of derived) users.set(source, [...(users.get(source) ?? []), entry]);
      if (entry.open === 0) ready.push(entry);
    });
    for (let next = 0; next < ready.length; next++) {
      for (const user of users.get(ready[next]!.constant) ?? []) if (--user.open === 0) ready.push(user);
    }
    return ready;
  }
}
