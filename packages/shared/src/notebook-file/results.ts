import * as z from 'zod/mini';
import type { CellOutcome } from '../cells/cell.ts';
import { cellKinds } from '../cells/kind.ts';
import type { CellError } from '../protocol/messages.ts';

export const resultsFormat = 'stillroom-results/1';

const cellError = z.strictObject({
  message: z.string(),
  line: z.optional(z.int()),
  column: z.optional(z.int()),
  hint: z.optional(z.string()),
});

/** What became of one cell. `digest` is null where a cell could not be given one; `partial` marks part of a course. */
export const cellResult = z.strictObject({
  kind: z.enum(cellKinds),
  status: z.enum(['ok', 'failed']),
  digest: z.nullable(z.string()),
  result: z.optional(z.unknown()),
  error: z.optional(cellError),
  partial: z.optional(z.literal(true)),
  warnings: z.array(z.string()),
});

/** The results of a notebook, by name of the cell; prose without a name by id. */
export const resultsFile = z.strictObject({
  format: z.literal(resultsFormat),
  engine: z.string(),
  cells: z.record(z.string(), cellResult),
});

export type CellResult = z.infer<typeof cellResult>;
export type ResultsFile = z.infer<typeof resultsFile>;

/** An outcome as a results file has it. */
export function resultOf(kind: CellResult['kind'], digest: string | null, outcome: CellOutcome): CellResult {
  const common = { kind, digest, warnings: [...outcome.warnings] };
  if (outcome.status === 'ok') return { ...common, status: 'ok', result: outcome.result };
  return {
    ...common,
    status: 'failed',
    ...(outcome.result === undefined ? {} : { result: outcome.result }),
    error: outcome.error,
    ...(outcome.partial === true ? { partial: true as const } : {}),
  };
}

/** A cell that never ran, with the reason. */
export function failureOf(kind: CellResult['kind'], digest: string | null, error: CellError): CellResult {
  return { kind, digest, warnings: [], status: 'failed', error };
}
