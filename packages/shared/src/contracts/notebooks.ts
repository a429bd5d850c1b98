import * as z from 'zod/mini';
import type { CellError, CellState } from '../protocol/index.ts';
import type { Ability, GroupRole } from '../roles/index.ts';
import { type Person, title } from './groups.ts';

export const notebookRequest = z.object({ title });
export const publishRequest = z.object({ public: z.boolean() });
export const remarkRequest = z.object({
  cell: z.string().check(z.maxLength(100)),
  quote: z.string().check(z.maxLength(500)),
  text: z.string().check(z.trim(), z.minLength(1, 'A remark needs words.'), z.maxLength(10_000)),
});
export const answerRequest = z.object({ text: remarkRequest.shape.text });
export const settleRequest = z.object({ settled: z.boolean() });

/** One line of the Shelf. */
export interface ShelfRow {
  readonly id: string;
  readonly title: string;
  /** First words of its first prose cell. */
  readonly opening: string;
  readonly group: { readonly id: string; readonly name: string; readonly hue: number };
  readonly role: GroupRole;
  /** States of its cells in order, for the seam in small; prose is 'prose'. */
  readonly seam: readonly (CellState | 'prose')[];
  readonly claims: { readonly holds: number; readonly fails: number; readonly undecided: number };
  readonly people: readonly Person[];
  readonly lastWork: { readonly at: string; readonly by: Person | null };
  readonly deletedAt: string | null;
}

/** GET /api/shelf */
export interface ShelfView {
  readonly notebooks: readonly ShelfRow[];
  readonly bin: readonly ShelfRow[];
  readonly waiting: readonly { readonly words: string; readonly to: string; readonly at: string }[];
  readonly lately: readonly { readonly words: string; readonly to: string; readonly at: string }[];
}

/** GET /api/notebooks/:notebook; the live document comes over the socket /live/:notebook. */
export interface NotebookView {
  readonly id: string;
  readonly title: string;
  readonly group: { readonly id: string; readonly name: string; readonly hue: number };
  readonly role: GroupRole;
  readonly abilities: readonly Ability[];
  /** Address of the public fair copy, where the lead has opened one. */
  readonly publicLink: string | null;
  readonly records: readonly { readonly id: string; readonly number: number; readonly at: string }[];
}

/** A kept result: GET /api/notebooks/:notebook/results/:digest (immutable). */
export interface ResultView {
  readonly digest: string;
  readonly kind: string;
  readonly result: unknown;
  readonly resultDigest: string;
  readonly warnings: readonly string[];
  readonly took: number;
}

const triedValues = z.record(z.string().check(z.maxLength(200)), z.number());

/** POST /api/notebooks/:notebook/cells/:cell/trial: values by name in place of the cell's own. */
export const trialRequest = z.strictObject({
  constants: z.optional(triedValues),
  start: z.optional(triedValues),
});
export type TrialRequest = z.infer<typeof trialRequest>;

/** What the cell comes to with these values. Nothing of the notebook changes, and nobody else sees it. */
export type TrialView =
  | { readonly status: 'ok'; readonly result: unknown; readonly warnings: readonly string[] }
  | { readonly status: 'failed'; readonly error: CellError };

/** GET /api/notebooks/:notebook/remarks */
export interface RemarkView {
  readonly id: string;
  readonly cell: string;
  readonly quote: string;
  readonly text: string;
  readonly by:
    Person | { readonly name: string; readonly initials: string; readonly hue: number; readonly id: null };
  readonly at: string;
  /** From a review of a record, not from the group. */
  readonly fromReview: { readonly record: string; readonly number: number } | null;
  readonly answers: readonly {
    readonly id: string;
    readonly text: string;
    readonly by: Person;
    readonly at: string;
  }[];
  readonly settled: { readonly by: Person; readonly at: string } | null;
}

/** A cell of a fair copy as it stands, with its result: what readers, public links and records show. */
export interface FairCell {
  readonly id: string;
  readonly kind: string;
  readonly name: string;
  readonly text: string;
  readonly settings: Readonly<Record<string, unknown>>;
  readonly state: CellState;
  readonly digest: string | null;
  readonly resultDigest: string | null;
  readonly result: unknown;
  readonly error: CellError | null;
  readonly warnings: readonly string[];
}

/** GET /api/public/:token, and GET /api/notebooks/:notebook/fair-copy */
export interface FairCopy {
  readonly title: string;
  readonly subject: string;
  readonly group: string;
  readonly authors: readonly string[];
  readonly at: string;
  readonly cells: readonly FairCell[];
}
