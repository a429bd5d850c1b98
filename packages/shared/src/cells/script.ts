import * as z from 'zod/mini';
import { cellReference } from './settings.ts';

/** Settings of a script: the cells whose results it sees, kept by the application from the names in its text. */
export const scriptSettings = z.strictObject({
  draws: z.optional(z.array(cellReference).check(z.maxLength(200))),
});

/** What a script printed, line by line, and what it returned, as JSON. */
export interface ScriptResult {
  readonly printed: readonly string[];
  readonly value: unknown;
}
