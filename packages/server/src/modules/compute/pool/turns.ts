/** Something that waits, and whose it is. */
export interface Waiting {
  readonly owner: string;
  /** What of the owner's it is for, where that matters: parts take turns too. */
  readonly part?: string;
}

/**
 * A queue in which owners take turns, and the parts of each: next is somebody of the owner with the fewest things under
 * way, among equals of the one who was served longest ago, and of that owner's parts the same. Within a part the order of
 * arrival holds among those who may go on.
 */
export class Turns<T extends Waiting> {
  private readonly lines = new Map<string, T[]>();
  private readonly owners = new Shares();
  private readonly parts = new Shares();

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
    for (const owner of this.owners.inTurn(this.lines.keys())) {
      const line = this.lines.get(owner)?.filter(may) ?? [];
      const [part] = this.parts.inTurn(new Set(line.map(partOf)));
      const item = line.find((one) => partOf(one) === part);
      if (item === undefined) continue;
      this.remove(item);
      this.owners.begin(owner);
      this.parts.begin(partOf(item));
      return item;
    }
    return undefined;
  }

  done(item: T): void {
    const waits = this.lines.get(item.owner);
    this.owners.end(item.owner, waits !== undefined);
    this.parts.end(partOf(item), waits?.some((one) => partOf(one) === partOf(item)) ?? false);
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
}

const partOf = ({ owner, part = '' }: Waiting): string => `${owner}\n${part}`;

/** How much each has had: what is under way, and when it was served last. Those who want nothing are forgotten. */
class Shares {
  private readonly under = new Map<string, number>();
  private readonly served = new Map<string, number>();
  private turn = 0;

  /** These in the order in which they are served next. */
  inTurn(keys: Iterable<string>): string[] {
    const running = (key: string) => this.under.get(key) ?? 0;
    const last = (key: string) => this.served.get(key) ?? 0;
    return [...keys].sort((a, b) => running(a) - running(b) || last(a) - last(b));
  }

  begin(key: string): void {
    this.served.set(key, ++this.turn);
    this.under.set(key, (this.under.get(key) ?? 0) + 1);
  }

  end(key: string, wantsMore: boolean): void {
    const left = (this.under.get(key) ?? 0) - 1;
    if (left > 0) this.under.set(key, left);
    else this.under.delete(key);
    if (left <= 0 && !wantsMore) this.served.delete(key);
  }
}
