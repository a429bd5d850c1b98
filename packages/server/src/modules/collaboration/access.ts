import type { GroupRole } from '@stillroom/shared/roles';

/** The role that counts for a person at a notebook now; null is none, 'gone' a notebook that is not there. */
export type RoleNow = GroupRole | 'gone' | null;
export type ReadRole = (person: string, notebook: string) => Promise<RoleNow>;

/** What changed: of one person or everybody, at one notebook or everywhere. */
export interface AccessChange {
  readonly person?: string;
  readonly notebook?: string;
}

/**
 * How long a role that was read may be used when no news of a change comes, in milliseconds. News, from this process or
 * another, ends it at once; this bounds what a lost line for news can cost.
 */
const longest = 1000;

interface Remembered {
  readonly person: string;
  readonly notebook: string;
  readonly role: RoleNow;
  readonly until: number;
}

/** Roles as they are now: read from the database, and used again only until news of a change, for a second at most. */
export class Access {
  readonly #read: ReadRole;
  readonly #clock: () => number;
  readonly #remembered = new Map<string, Remembered>();
  /** Counts changes, so that what was asked before a change is not remembered after it. */
  #changes = 0;

  constructor(read: ReadRole, clock: () => number = Date.now) {
    this.#read = read;
    this.#clock = clock;
  }

  /** The role that counts now. */
  async roleAt(person: string, notebook: string): Promise<RoleNow> {
    const key = `${person} ${notebook}`;
    const remembered = this.#remembered.get(key);
    if (remembered !== undefined && this.#clock() < remembered.until) return remembered.role;
    const before = this.#changes;
    const until = this.#clock() + longest;
    const role = await this.#read(person, notebook);
    if (before === this.#changes) this.#remembered.set(key, { person, notebook, role, until });
    return role;
  }

  /** Forgets what a change may have made wrong; without a name, everything. */
  forget(change: AccessChange = {}): void {
    this.#changes += 1;
    for (const [key, known] of this.#remembered) {
      if (change.person !== undefined && change.person !== known.person) continue;
      if (change.notebook !== undefined && change.notebook !== known.notebook) continue;
      this.#remembered.delete(key);
    }
  }
}
