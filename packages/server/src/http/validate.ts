import * as z from 'zod/mini';
import { invalid } from '../errors.ts';

export type Schema = z.core.$ZodType;

/** Parameters of paths, by what they name. Tokens are only bounded: their look is nobody's business. */
export const uuid = z.uuid();
export const token = z.string().check(z.minLength(1), z.maxLength(200));

/**
 * What was sent, as the schema makes it.
 * @throws invalid, with a sentence for each field that is wrong.
 */
export function validate<S extends Schema>(schema: S, value: unknown): z.output<S> {
  const read = z.safeParse(schema, value ?? {});
  if (read.success) return read.data;
  const fields: Record<string, string> = {};
  for (const issue of read.error.issues) fields[issue.path.join('.') || 'body'] ??= issue.message;
  const [first] = Object.entries(fields);
  const words = first === undefined ? 'What was sent cannot be read.' : sentence(first[0], first[1]);
  throw invalid(words, { fields });
}

/** A schema's own words stand as they are; the library's bare ones are told which field they mean. */
function sentence(field: string, message: string): string {
  return message.endsWith('.') ? message : `${field}: ${message}.`;
}
