import type { CellNotice } from '@stillroom/shared/protocol';
import type { Occupant, Room } from '../collaboration/index.ts';
import { type CellNews, planFrame } from './notices.ts';

/**
 * Milliseconds for which "it is being computed" is held back: most results are there sooner, and every frame to every
 * person costs. Whatever else there is to tell takes it along, so that one frame never contradicts the next.
 */
const holding = 60;

/** Whether a notice only says that a result is on its way. */
const isPassing = ({ state, digest, shown, since }: CellNotice): boolean =>
  since === undefined && digest !== shown && state !== 'failed' && state !== 'held';

/** What a room has been told of its cells; tells it what is different. */
export class Announcer {
  readonly #room: Room;
  #said = new Map<string, string>();
  #latest: readonly CellNews[] = [];
  #timer: NodeJS.Timeout | null = null;

  constructor(room: Room) {
    this.#room = room;
  }

  /** Tells everybody everything. */
  tellAll(cells: readonly CellNews[]): void {
    this.#latest = cells;
    this.#said = textsOf(cells);
    this.#room.send(planFrame(true, cells, []), null);
  }

  /** Tells somebody who has come in everything. */
  greet(connection: Occupant, cells: readonly CellNews[]): void {
    connection.send(planFrame(true, cells, []));
  }

  /** Tells everybody what is different from what they know, at once or, where it is only passing, soon. */
  tell(cells: readonly CellNews[]): void {
    this.#latest = cells;
    const { news, gone } = this.#difference();
    if (news.length === 0 && gone.length === 0) return;
    if (gone.length > 0 || !news.every(({ notice }) => isPassing(notice))) return this.#send();
    this.#timer ??= setTimeout(() => this.#send(), holding).unref();
  }

  stop(): void {
    if (this.#timer !== null) clearTimeout(this.#timer);
  }

  #send(): void {
    this.stop();
    this.#timer = null;
    const { news, gone, texts } = this.#difference();
    this.#said = texts;
    if (news.length > 0 || gone.length > 0) this.#room.send(planFrame(false, news, gone), null);
  }

  #difference(): { news: CellNews[]; gone: string[]; texts: Map<string, string> } {
    const texts = textsOf(this.#latest);
    return {
      texts,
      news: this.#latest.filter(({ notice }) => this.#said.get(notice.id) !== texts.get(notice.id)),
      gone: [...this.#said.keys()].filter((id) => !texts.has(id)),
    };
  }
}

const textsOf = (cells: readonly CellNews[]): Map<string, string> =>
  new Map(cells.map(({ notice }) => [notice.id, JSON.stringify(notice)]));
