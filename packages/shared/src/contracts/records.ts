import * as z from 'zod/mini';
import type { Ability } from '../roles/index.ts';
import { email } from './account.ts';
import type { Person } from './groups.ts';
import type { FairCell, RemarkView } from './notebooks.ts';

export const freezeRequest = z.object({
  /** Reasons for what stays open (open remarks, failing claims), by check id; printed in the record. */
  reasons: z.record(z.string(), z.string().check(z.maxLength(1000))),
});
export const reviewInvitation = z.object({
  email,
  name: z.string().check(z.trim(), z.maxLength(120)),
  masked: z.boolean(),
  /** Last day the link works, ISO date. */
  until: z.iso.date(),
  message: z.string().check(z.maxLength(2000)),
});
export const rerunRequest = z.object({ cell: z.optional(z.string()) });
export const reviewRemark = z.object({
  cell: z.string(),
  quote: z.string().check(z.maxLength(500)),
  text: z.string().check(z.trim(), z.minLength(1), z.maxLength(10_000)),
});
export const verdictRequest = z.object({
  recommendation: z.enum(['take', 'take when met', 'look again', 'do not take']),
  toAuthors: z.string().check(z.maxLength(20_000)),
  toEditor: z.string().check(z.maxLength(20_000)),
  claims: z.record(z.string(), z.enum(['supported', 'in part', 'not supported'])),
});

/** One line of the check before freezing. `blocking` must be empty; the rest may stay open for a reason. */
export interface FreezeCheck {
  readonly id: string;
  /** What must be so. */
  readonly words: string;
  readonly state: 'met' | 'open' | 'blocking';
  readonly cells: readonly { readonly id: string; readonly name: string; readonly why: string }[];
}

/** GET /api/notebooks/:notebook/freeze */
export interface FreezeView {
  readonly checks: readonly FreezeCheck[];
  /** Cells still working: freezing waits for them. */
  readonly working: number;
  readonly nextNumber: number;
}

/** GET /api/records/:record, GET /api/public-records/:token */
export interface RecordView {
  readonly id: string;
  readonly number: number;
  readonly title: string;
  readonly subject: string;
  readonly group: { readonly id: string; readonly name: string };
  readonly notebook: string;
  readonly authors: readonly string[];
  readonly frozenAt: string;
  readonly frozenBy: string;
  readonly engine: string;
  /** "sha256:…" over the whole record. */
  readonly digest: string;
  readonly reasons: Readonly<Record<string, string>>;
  readonly cells: readonly FairCell[];
  readonly abilities: readonly Ability[];
  readonly reviews: readonly ReviewSummary[];
  readonly remarks: readonly RemarkView[];
  /** Address of the public copy for members; null where it is closed, absent for everybody else. */
  readonly publicLink?: string | null;
}

/** What the authors' side sees of a review; masked reviewers are "Reviewer 1". */
export interface ReviewSummary {
  readonly id: string;
  readonly name: string;
  readonly masked: boolean;
  readonly email: string | null;
  readonly until: string;
  readonly state: 'invited' | 'opened' | 'returned' | 'withdrawn' | 'expired';
  readonly invitedAt: string;
  readonly verdict: {
    readonly recommendation: string;
    readonly toAuthors: string;
    readonly at: string;
  } | null;
}

export type RerunOutcome = 'matches' | 'differs' | 'failed';

/** A rerun by the reviewer: fresh runs on the server, compared by result digest; nothing of the record changes. */
export interface RerunView {
  readonly id: string;
  readonly at: string;
  readonly done: boolean;
  /** Version of the engine that computes it, null while it waits; that of the record is `RecordView.engine`. */
  readonly engine: string | null;
  readonly cells: Readonly<
    Record<
      string,
      {
        readonly outcome: RerunOutcome | 'working' | 'waiting';
        readonly why?: string;
        readonly result?: unknown;
      }
    >
  >;
}

/** GET /api/review/:token: everything the link opens. */
export interface ReviewView {
  readonly record: RecordView;
  readonly you: { readonly name: string; readonly masked: boolean; readonly until: string };
  readonly remarks: readonly RemarkView[];
  readonly rerun: RerunView | null;
  readonly verdict: z.infer<typeof verdictRequest> | null;
  readonly by: Person;
}
