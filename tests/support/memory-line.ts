import * as decoding from 'lib0/decoding';
import { messageTypes } from '@stillroom/shared/protocol';

/** A line in memory: keeps what the server sends and why it ended. */
export class MemoryLine {
  readonly frames: Uint8Array[] = [];
  closed: { code: number; why: string } | null = null;

  send(bytes: Uint8Array): void {
    this.frames.push(bytes);
  }

  close(code: number, why: string): void {
    this.closed = { code, why };
  }

  /** Bodies of the frames of a type. */
  ofType(type: number): Uint8Array[] {
    return this.frames.filter((frame) => frame[0] === type).map((frame) => frame.subarray(1));
  }

  /** The last count of committed frames. */
  get kept(): number {
    const last = this.ofType(messageTypes.kept).at(-1);
    return last === undefined ? 0 : decoding.readVarUint(decoding.createDecoder(last));
  }
}
