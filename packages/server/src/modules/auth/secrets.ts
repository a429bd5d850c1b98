import { createHash, randomBytes } from 'node:crypto';

/** A token for a link: 256 random bits, safe in an address. */
export const newToken = (): string => randomBytes(32).toString('base64url');

/** What is kept of a token: enough to know it again, useless to whoever reads the database. */
export const digestOf = (token: string): string => createHash('sha256').update(token).digest('base64url');
