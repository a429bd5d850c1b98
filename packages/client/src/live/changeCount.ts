/**
 * Counts local changes until the server says they are committed. State vectors do not see deletions, so frames are
 * counted instead: each document frame carries the changes made since the last one, and the server answers with how
 * many frames of this connection it has committed. The numbers begin anew with each connection; what was under way
 * when a line broke goes with the first frame of the next.
 */
export class ChangeCount {
  private unsent: number;
  private underWay: number[] = [];
  private committed = 0;

  /** `unsent`: changes that an earlier page left behind on this machine. */
  constructor(unsent = 0) {
    this.unsent = unsent;
  }

  /** A local change was made; must be told before its frame is sent. */
  changed(): void {
    this.unsent += 1;
  }

  /** A document frame (sync step 2 or update) was handed to the socket. */
  sent(): void {
    this.underWay.push(this.unsent);
    this.unsent = 0;
  }

  /** The server has committed the first `frames` document frames of this connection. */
  kept(frames: number): void {
    this.underWay.splice(0, Math.max(0, frames - this.committed));
    this.committed = Math.max(this.committed, frames);
  }

  /** The connection is gone. */
  closed(): void {
    this.unsent = this.pending;
    this.underWay = [];
    this.committed = 0;
  }

  /** Changes that are on this machine only, as far as is known. */
  get pending(): number {
    return this.underWay.reduce((sum, changes) => sum + changes, this.unsent);
  }

  /** Whether every frame sent is committed. */
  get settled(): boolean {
    return this.unsent === 0 && this.underWay.length === 0;
  }
}
