import { readSync } from 'node:fs';
import { stopPipe, stopReasons } from '@stillroom/shared/protocol';
import { StopRequested } from '../engine/index.ts';

/** One order to stop: the reason, then the number of the run as four bytes, little-endian. */
const orderLength = 5;
/** Milliseconds between two looks at the pipe: a look costs about fifteen microseconds. */
const lookEvery = 4;

/**
 * Watches the pipe by which a host ends a run. A computing process reads no messages, so the pipe is looked at from within
 * the computation. An order for another run than the present one is passed over.
 */
export class StopWatch {
  private readonly bytes = Buffer.alloc(orderLength * 64);
  private held = 0;
  private run = 0;
  private nextLook = 0;

  constructor() {
    // Taking hold of standard input, at rest, is what makes reading from it return at once when it is empty.
    process.stdin.pause();
  }

  begin(run: number): void {
    this.run = run;
    this.nextLook = 0;
  }

  /** @throws StopRequested where the present run is to end */
  check(): void {
    const now = performance.now();
    if (now < this.nextLook) return;
    this.nextLook = now + lookEvery;
    const reason = this.readOrder();
    if (reason !== null) throw new StopRequested(reason);
  }

  private readOrder(): 'deadline' | 'stop' | null {
    try {
      this.held += readSync(stopPipe, this.bytes, this.held, this.bytes.length - this.held, null);
    } catch {
      // Nothing there (EAGAIN), or the host is gone, which ends the process by itself.
    }
    let found: 'deadline' | 'stop' | null = null;
    let at = 0;
    for (; at + orderLength <= this.held; at += orderLength) {
      if (this.bytes.readUInt32LE(at + 1) !== this.run) continue;
      found = this.bytes[at] === stopReasons.stop ? 'stop' : 'deadline';
    }
    this.bytes.copyWithin(0, at, this.held);
    this.held -= at;
    return found;
  }
}
