import type { Person } from '@stillroom/shared/contracts';
import { type CloseCode, closeCodes, limits } from '@stillroom/shared/protocol';
import { type Ability, may } from '@stillroom/shared/roles';
import type { Access, RoleNow } from './access.ts';
import { type Incoming, isEmptyUpdate, keptFrame, noticeFrame, readFrame } from './frames.ts';
import type { Occupant } from './occupant.ts';
import type { Room } from './room.ts';

/** What a connection asks of its line: the `ws` socket has it, and so has a pair in memory. */
export interface Line {
  send(bytes: Uint8Array): void;
  close(code: number, why: string): void;
}

/** What each message needs, decided by the role that counts when it comes. */
export const messageAbilities: Readonly<Record<Incoming['kind'], Ability>> = {
  step1: 'notebook.read',
  step2: 'notebook.edit',
  update: 'notebook.edit',
  awareness: 'notebook.read',
};

const refusals: Readonly<Record<Incoming['kind'], string>> = {
  step1: 'You may not read this notebook any more.',
  awareness: 'You may not read this notebook any more.',
  step2: 'You may not write in this notebook; what you wrote was not taken.',
  update: 'You may not write in this notebook; what you wrote was not taken.',
};

/** Frames one connection may send: this many at once, and this many a second in the long run. */
const burst = 4000;
const perSecond = 400;

/**
 * One live line to one person. Frames are handled strictly in order; each is judged by the role that counts at that
 * moment. The first refusal ends the line: Yjs would hold back everything that builds on what was refused.
 */
export class Connection implements Occupant {
  readonly person: Person;
  readonly room: Room;
  readonly #line: Line;
  readonly #access: Access;
  #open = true;
  #edits = false;
  #turn: Promise<void> = Promise.resolve();
  /** Document frames received, and those committed, of this connection. */
  #received = 0;
  #kept = 0;
  #telling = false;
  #allowance = burst;
  #allowedAt = Date.now();

  constructor(person: Person, room: Room, line: Line, access: Access) {
    this.person = person;
    this.room = room;
    this.#line = line;
    this.#access = access;
  }

  /** Whether the person could write when last asked; never decides about a message. */
  get edits(): boolean {
    return this.#edits;
  }

  /** Comes into the room. */
  join(edits: boolean): void {
    this.#edits = edits;
    this.room.join(this, edits);
  }

  /** Sends a frame; a line that is closing swallows it. */
  send(frame: Uint8Array): void {
    if (this.#open) this.#line.send(frame);
  }

  /** Says how many of its document frames are committed. */
  tellKept(): void {
    this.send(keptFrame(this.#kept));
  }

  /** Takes a frame in turn. */
  receive(bytes: Uint8Array): void {
    if (!this.#open) return;
    if (bytes.length > limits.frame || !this.#withinAllowance())
      return this.end(closeCodes.tooMuch, 'More was sent than one connection may send.');
    const frame = readFrame(bytes);
    if (frame === null) return this.end(closeCodes.malformed, 'A message was not understood.');
    // Asked for when the frame comes, so that a burst shares a read; the frame is handled in its turn.
    const role = this.#access.roleAt(this.person.id, this.room.notebook);
    role.catch(() => undefined);
    this.#turn = this.#turn.then(() => this.#handle(frame, role));
  }

  /** Ends the line from this side. What is still in turn is dropped. */
  end(code: CloseCode, why: string): void {
    if (!this.#open) return;
    this.left();
    this.#line.close(code, why);
  }

  /** The line is gone. */
  left(): void {
    this.#open = false;
    this.room.leave(this);
  }

  /**
   * Judges the line anew after a change of access: whoever may no longer do what they could is let out at once, whoever
   * may write now is asked for what the server lacks.
   */
  async reconsider(): Promise<void> {
    const role = await this.#access.roleAt(this.person.id, this.room.notebook);
    if (role === 'gone') return this.end(closeCodes.gone, 'The notebook is in the bin.');
    if (!may(role, 'notebook.read')) return this.end(closeCodes.refused, refusals.step1);
    const edits = may(role, 'notebook.edit');
    if (this.#edits && !edits) return this.end(closeCodes.refused, refusals.update);
    if (edits && !this.#edits) this.room.ask(this);
    this.#edits = edits;
    this.send(noticeFrame({ topic: 'access' }));
  }

  async #handle(frame: Incoming, asked: Promise<RoleNow>): Promise<void> {
    if (!this.#open) return;
    try {
      const writes = frame.kind === 'step2' || frame.kind === 'update';
      if (writes) this.#received += 1;
      // An answer without content is what a reader's client gives when asked; it changes nothing.
      if (writes && isEmptyUpdate(frame.update)) return this.#keepAfter(this.room.settled());
      const role = await asked;
      if (!this.#open) return;
      if (role === 'gone') return this.end(closeCodes.gone, 'The notebook is in the bin.');
      if (!may(role, messageAbilities[frame.kind])) return this.end(closeCodes.refused, refusals[frame.kind]);
      this.#take(frame);
    } catch {
      this.end(closeCodes.later, 'The server cannot reach its database; what you write stays with you.');
    }
  }

  #take(frame: Incoming): void {
    if (frame.kind === 'step1') return this.#answer(frame.stateVector);
    if (frame.kind === 'awareness') {
      if (!this.room.present(frame.update, this))
        this.end(closeCodes.malformed, 'A presence was not understood.');
      return;
    }
    let committed: Promise<void>;
    try {
      committed = this.room.write(frame.update, this);
    } catch {
      return this.end(closeCodes.malformed, 'An edit was not understood.');
    }
    this.#keepAfter(committed);
  }

  #answer(stateVector: Uint8Array): void {
    let answer: Uint8Array;
    try {
      answer = this.room.answer(stateVector);
    } catch {
      return this.end(closeCodes.malformed, 'A state was not understood.');
    }
    this.send(answer);
  }

  /** Acknowledges the frames so far once a commit is done. Commits come in order, so a count is enough. */
  #keepAfter(committed: Promise<void>): void {
    const count = this.#received;
    committed.then(
      () => {
        this.#kept = Math.max(this.#kept, count);
        if (this.#telling) return;
        this.#telling = true;
        // Several frames of one batch are acknowledged together.
        queueMicrotask(() => {
          this.#telling = false;
          this.tellKept();
        });
      },
      () => this.room.abandon(),
    );
  }

  #withinAllowance(): boolean {
    const now = Date.now();
    this.#allowance = Math.min(burst, this.#allowance + ((now - this.#allowedAt) / 1000) * perSecond);
    this.#allowedAt = now;
    this.#allowance -= 1;
    return this.#allowance >= 0;
  }
}
