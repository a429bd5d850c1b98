import { createHash } from 'node:crypto';
import type { FairCell } from '@stillroom/shared/contracts';
import canonicalize from 'canonicalize';

export const recordFormat = 'stillroom-record/1';

/** A cell as it was frozen, with the ids of what it draws on. */
export interface RecordCell extends FairCell {
  readonly draws: readonly string[];
}

/** Everything a record says. It is digested as a whole, so nothing in it can be exchanged. */
export interface RecordContent {
  readonly format: typeof recordFormat;
  readonly group: { readonly id: string; readonly name: string };
  readonly number: number;
  readonly notebook: string;
  readonly title: string;
  readonly subject: string;
  readonly authors: readonly string[];
  readonly frozenAt: string;
  readonly frozenBy: string;
  /** Version of the engine that computed it. */
  readonly engine: string;
  /** Why something stayed open, by the id of the check. */
  readonly reasons: Readonly<Record<string, string>>;
  readonly cells: readonly RecordCell[];
}

/** The content as RFC 8785 JSON with the SHA-256 of that text. */
export function sealContent(content: RecordContent): { readonly text: string; readonly digest: string } {
  const text = canonicalize(content);
  if (text === undefined) throw new TypeError('A record holds only JSON.');
  return { text, digest: digestOfText(text) };
}

/** "sha256:…" of a text as UTF-8. */
export const digestOfText = (text: string): string =>
  `sha256:${createHash('sha256').update(text, 'utf8').digest('hex')}`;

/**
 * A record as one file: the content with its digest as the first key. Whoever takes that key out and writes the rest
 * as RFC 8785 JSON gets the bytes that the digest is of.
 */
export const recordFileText = (digest: string, text: string): string =>
  `{"digest":${JSON.stringify(digest)},${text.slice(1)}\n`;
