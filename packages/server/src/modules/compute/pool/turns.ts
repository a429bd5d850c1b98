/** Something that waits, and whose it is. */
export interface Waiting {
  readonly owner: string;
}

/**
 * A queue in which owners take turns: next is the first in the line of the owner with the fewest things under way, among
 * equals of the one who was served longest ago. Within a line the order of arrival holds among those who may go on.
 */
export class Turns<T extends Waiting> {
  private readonly lines = new Map<string, T[]>();
  private readonly under = new Map<string, number>();
  private readonly served = new Map<string, number>();
  private turn = 0;

  add(item: T): void {
    const line = this.lines.get(item.owner);
    if (line === undefined) this.lines.set(item.owner, [item]);
    else line.push(item);
  }

  /** Takes an item out of its line before its turn; false where it is not waiting. */
  remove(item: T): boolean {
    const line = this.lines.get(item.owner) ?? [];
    const at = line.indexOf(item);
    if (at < 0) return false;
    line.splice(at, 1);
    if (line.length === 0) this.lines.delete(item.owner);
    return true;
  }

  /** The next item that may go on, which counts as under way until `done`. */
  next(may: (item: T) => boolean = () => true): T | undefined {
    const owners = [...this.lines.keys()].sort(
      (a, b) => this.running(a) - this.running(b) || (this.served.get(a) ?? 0) - (this.served.get(b) ?? 0),
    );
    for (const owner of owners) {
      const item = this.lines.get(owner)?.find(may);
      if (item === undefined) continue;
      this.remove(item);
      this.served.set(owner, ++this.turn);
      this.under.set(owner, this.running(owner) + 1);
      return item;
    }
    return undefined;
  }

  done(item: T): void {
    const left = this.running(item.owner) - 1;
    if (left > 0) this.under.set(item.owner, left);
    else this.under.delete(item.owner);
    if (left <= 0 && !this.lines.has(item.owner)) this.served.delete(item.owner);
  }

  /** How many wait. */
  get size(): number {
    return [...this.lines.values()].reduce((sum, line) => sum + line.length, 0);
  }

  /** How many wait, by owner. */
  waiting(): ReadonlyMap<string, number> {
    return new Map([...this.lines].map(([owner, line]) => [owner, line.length]));
  }

  /** Takes everything that waits. */
  drain(): T[] {
    const all = [...this.lines.values()].flat();
    this.lines.clear();
    return all;
  }

  private running(owner: string): number {
    return this.under.get(owner) ?? 0;
  }
}
