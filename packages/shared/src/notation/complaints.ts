import type { Complaint, Repair } from './complaint.ts';
import { Failure } from './failure.ts';
import { afterNewline } from './tokens.ts';

/** More than this nobody reads, and a pasted file that is no network at all would make a million. */
const LIMIT = 500;

/** Where each line of a text begins, for turning offsets into lines and columns. */
export class LineIndex {
  private readonly starts: number[] = [0];

  constructor(text: string) {
    for (let at = 0; at < text.length; at += 1) {
      const next = afterNewline(text, at);
      if (next < 0) continue;
      this.starts.push(next);
      at = next - 1;
    }
  }

  /** 1-based line and column of an offset. */
  position(offset: number): { line: number; column: number } {
    let low = 0;
    let high = this.starts.length - 1;
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if ((this.starts[middle] ?? 0) <= offset) low = middle;
      else high = middle - 1;
    }
    return { line: low + 1, column: offset - (this.starts[low] ?? 0) + 1 };
  }
}

/** Gathers what is wrong with one text. */
export class Complaints {
  private readonly found: Complaint[] = [];
  private index: LineIndex | null = null;
  private errors = 0;
  private readonly text: string;

  constructor(text: string) {
    this.text = text;
  }

  get hasErrors(): boolean {
    return this.errors > 0;
  }

  error(
    at: { from: number; to: number },
    message: string,
    hint?: string | null,
    repairs?: readonly Repair[],
  ): void {
    this.errors += 1;
    this.add('error', at, message, hint, repairs);
  }

  warning(at: { from: number; to: number }, message: string, hint?: string | null): void {
    this.add('warning', at, message, hint);
  }

  /** Notes a failure; anything else that was thrown is a fault of ours and goes on its way. */
  failure(thrown: unknown): void {
    if (!(thrown instanceof Failure)) throw thrown;
    if (thrown.silent) this.errors += 1;
    else this.error(thrown, thrown.message, thrown.hint, thrown.repairs);
  }

  /** In order of position; of more than 500 the first 500. */
  list(): readonly Complaint[] {
    return [...this.found].sort((a, b) => a.from - b.from || a.to - b.to).slice(0, LIMIT);
  }

  private add(
    severity: Complaint['severity'],
    at: { from: number; to: number },
    message: string,
    hint: string | null = null,
    repairs: readonly Repair[] = [],
  ): void {
    if (this.found.length >= LIMIT * 4) return;
    this.index ??= new LineIndex(this.text);
    const from = Math.min(at.from, this.text.length);
    const to = Math.max(from, Math.min(at.to, this.text.length));
    this.found.push({ severity, ...this.index.position(from), from, to, message, hint, repairs });
  }
}
