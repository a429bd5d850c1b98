import type { GroupRole } from '@stillroom/shared/roles';

/** The role that counts for a person at a notebook now; null is none, 'gone' a notebook that is not there. */
export type RoleNow = GroupRole | 'gone' | null;

/** Someone at some notebook. */
export interface Place {
  readonly person: string;
  readonly notebook: string;
}
/** Reads the roles that count at these places, in their order. */
export type ReadRoles = (places: readonly Place[]) => Promise<readonly RoleNow[]>;

interface Asked {
  readonly place: Place;
  readonly role: Promise<RoleNow>;
  readonly answer: (role: RoleNow) => void;
  readonly fail: (error: unknown) => void;
}

/**
 * Roles as they are now. Nothing is remembered: every answer comes from a read that began after it was asked for, so
 * whatever was committed before a message came counts for it, in whichever process. What is asked while a read is
 * under way gathers and becomes the next one, one statement for everybody.
 */
export class Access {
  readonly #read: ReadRoles;
  #asked = new Map<string, Asked>();
  #reading = false;

  constructor(read: ReadRoles) {
    this.#read = read;
  }

  /** The role that counts now. */
  roleAt(person: string, notebook: string): Promise<RoleNow> {
    const key = `${person} ${notebook}`;
    let asked = this.#asked.get(key);
    if (asked === undefined) {
      asked = newQuestion({ person, notebook });
      this.#asked.set(key, asked);
    }
    if (!this.#reading) {
      this.#reading = true;
      // Not at once: several frames of one packet share one read.
      queueMicrotask(() => void this.#readAll());
    }
    return asked.role;
  }

  async #readAll(): Promise<void> {
    while (this.#asked.size > 0) {
      const batch = [...this.#asked.values()];
      this.#asked = new Map();
      try {
        const roles = await this.#read(batch.map(({ place }) => place));
        batch.forEach(({ answer }, index) => answer(roles[index] ?? null));
      } catch (error) {
        for (const { fail } of batch) fail(error);
      }
    }
    this.#reading = false;
  }
}

function newQuestion(place: Place): Asked {
  let answer: Asked['answer'] = () => undefined;
  let fail: Asked['fail'] = () => undefined;
  const role = new Promise<RoleNow>((resolve, reject) => {
    answer = resolve;
    fail = reject;
  });
  return { place, role, answer, fail };
}
