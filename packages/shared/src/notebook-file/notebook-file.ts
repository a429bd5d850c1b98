import * as z from 'zod/mini';
import { cellKinds } from '../cells/kind.ts';

export const notebookFormat = 'stillroom-notebook/1';

/** As in a live document. */
export const subjects = ['none', 'clinical', 'public health', 'process safety', 'environment'] as const;

/** One cell of a notebook file. */
export const fileCell = z.strictObject({
  /** Unique in the file; a cell without one is called by its place, c1, c2 … */
  id: z.optional(z.string().check(z.minLength(1), z.maxLength(100))),
  kind: z.enum(cellKinds),
  /** Unique in the file; prose may go without. */
  name: z._default(z.string().check(z.maxLength(200)), ''),
  /** What is written: prose, network, script, claim, specification. */
  text: z._default(z.string(), ''),
  /** The rest, as the kind of the cell has it; looked into when the cell is planned. */
  settings: z._default(z.record(z.string(), z.unknown()), {}),
  held: z._default(z.boolean(), false),
});

/** A notebook as a file, `*.stillroom.json`. */
export const notebookFile = z.strictObject({
  format: z.literal(notebookFormat),
  title: z._default(z.string().check(z.maxLength(200)), ''),
  subject: z._default(z.enum(subjects), 'none'),
  cells: z.array(fileCell),
});

type Parsed = z.infer<typeof notebookFile>;
export type FileCell = Omit<Parsed['cells'][number], 'id'> & { readonly id: string };
export type NotebookFile = Omit<Parsed, 'cells'> & { readonly cells: readonly FileCell[] };
