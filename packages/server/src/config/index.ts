import * as z from 'zod';
import { databaseSchema } from './database.ts';
import { httpSchema } from './http.ts';
import { mailSchema } from './mail.ts';
import { processSchema } from './process.ts';
import { sessionSchema } from './session.ts';

const schema = z.object({
  ...databaseSchema.shape,
  ...httpSchema.shape,
  ...sessionSchema.shape,
  ...mailSchema.shape,
  ...processSchema.shape,
});

/** Secrets and addresses, read once at start; what an operator changes lives in the database. */
export type Config = Readonly<z.infer<typeof schema>>;

/** A setting that cannot be used; its message names each variable. The value is never shown: it may be a secret. */
export class ConfigError extends Error {}

/**
 * Reads the environment. Empty values count as not set.
 * @throws ConfigError naming every variable that is missing or wrong.
 */
export function readConfig(environment: Readonly<Record<string, string | undefined>>): Config {
  const given = Object.fromEntries(Object.entries(environment).filter(([, value]) => value !== ''));
  const read = schema.safeParse(given);
  if (read.success) return read.data;
  const lines = read.error.issues.map((issue) => {
    const name = String(issue.path[0]);
    return `${name} ${given[name] === undefined ? 'is not set' : issue.message}`;
  });
  throw new ConfigError(`The start was stopped by its settings:\n  ${lines.join('\n  ')}`);
}

/** The address people reach the installation by, without a slash at the end. */
export function publicAddress(config: Config): string {
  return config.PUBLIC_URL?.replace(/\/+$/u, '') ?? `http://localhost:${config.PORT}`;
}
