import type { Person } from '@stillroom/shared/contracts';
import type { CloseCode } from '@stillroom/shared/protocol';

/** Somebody in a room, as the room knows them: a connection is one. */
export interface Occupant {
  readonly person: Person;
  /** Whether the person could write when last asked; never decides about a message. */
  readonly edits: boolean;
  /** Sends a frame. */
  send(frame: Uint8Array): void;
  /** Ends the line from this side. */
  end(code: CloseCode, why: string): void;
  /** Judges the line anew after a change of access. */
  reconsider(): Promise<void>;
}
