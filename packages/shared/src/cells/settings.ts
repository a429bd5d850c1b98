import * as z from 'zod/mini';

/** The name of a cell in settings; empty while nothing is chosen yet, which the plan explains. */
export const cellReference = z.string().check(z.maxLength(200));

/** A finite number; JSON has no others, a live document may. */
export const finite = z.number().check(z.refine(Number.isFinite, 'needs a finite number'));
const values = z.record(z.string(), finite);

/** Settings of a balance cell: constants given here take the place of the text's. */
export const balanceSettings = z.strictObject({
  network: cellReference,
  constants: z.optional(values),
});
