import * as z from 'zod/mini';

/** Settings of a claim: the reason its author gives. */
export const claimSettings = z.strictObject({
  because: z.optional(z.string().check(z.maxLength(5000))),
});

export const claimVerdicts = ['holds', 'fails', 'undecided'] as const;
export type ClaimVerdict = (typeof claimVerdicts)[number];

/** A side of a claim: a number, an exact rational beyond JSON ("3/2"), a word, a truth value; null where unknown. */
export type ClaimSide = number | string | boolean | null;

export interface ClaimResult {
  readonly verdict: ClaimVerdict;
  readonly left: ClaimSide;
  readonly right: ClaimSide;
  readonly why: string;
  /** The figures it rests on, in order of first mention, as the text spells them. */
  readonly figures: readonly { readonly path: string; readonly value: ClaimSide }[];
}
