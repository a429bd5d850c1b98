import { hash, verify } from '@node-rs/argon2';

/** argon2id with 19 MiB and two passes (the library's default variant; OWASP's first recommendation). */
const cost = { memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;

export const hashPassword = (password: string): Promise<string> => hash(password.normalize('NFKC'), cost);

let decoy: Promise<string> | null = null;

/**
 * Whether the password belongs to the hash. Where there is no account (`null`) it takes as long and says no, so that
 * the time of an answer does not tell which addresses have one.
 */
export async function isPassword(passwordHash: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword('a password that nobody has');
  const matches = await verify(passwordHash ?? (await decoy), password.normalize('NFKC'));
  return passwordHash !== null && matches;
}
