/** Milliseconds after which people of another process that has not told of them again are taken to be gone. */
const longestSilence = 60_000;

interface Told {
  readonly people: readonly string[];
  readonly at: number;
}

/** Who is at which notebook by lines to other processes, as those tell. */
export class PeopleElsewhere {
  readonly #told = new Map<string, Map<string, Told>>();
  readonly #now: () => number;

  constructor(now: () => number = Date.now) {
    this.#now = now;
  }

  /** Takes what a process tells. @returns whether it was not known to have anybody there. */
  hear(from: string, notebook: string, people: readonly string[]): boolean {
    const processes = this.#standing(notebook);
    const known = processes.has(from);
    if (people.length === 0) processes.delete(from);
    else processes.set(from, { people, at: this.#now() });
    if (processes.size === 0) this.#told.delete(notebook);
    else this.#told.set(notebook, processes);
    return people.length > 0 && !known;
  }

  /** Ids of everybody who is there, each once. */
  at(notebook: string): string[] {
    return [...new Set([...this.#standing(notebook).values()].flatMap(({ people }) => people))];
  }

  #standing(notebook: string): Map<string, Told> {
    const all = this.#told.get(notebook) ?? new Map<string, Told>();
    const oldest = this.#now() - longestSilence;
    return new Map([...all].filter(([, { at }]) => at >= oldest));
  }
}
