import type { EntityManager } from 'typeorm';
import { tooMany } from '../../errors.ts';
import { inWords } from '../../http/rate-limit.ts';

/**
 * How password guesses are slowed down. The first bound holds for one account from one address; the second for one
 * account from everywhere, higher, so that a stranger cannot easily lock the owner out.
 */
export const guessRules = [
  { scope: 'here', free: 5, firstPause: 15 },
  { scope: 'everywhere', free: 50, firstPause: 15 },
] as const;
const longestPause = 900;
/** Failures this long ago are forgotten. */
const memory = 3600;

const keysOf = (email: string, address: string): readonly string[] => [`${email} ${address}`, email];

/** @throws too-many while the account must rest. */
export async function refuseManyGuesses(
  manager: EntityManager,
  email: string,
  address: string,
): Promise<void> {
  const keys = keysOf(email, address);
  const rows: { key: string; failures: number; age: number }[] = await manager.query(
    `select key, failures, extract(epoch from now() - last_at)::float8 as age from password_guess
     where key = any($1)`,
    [keys],
  );
  for (const [index, rule] of guessRules.entries()) {
    const row = rows.find(({ key }) => key === keys[index]);
    if (row === undefined || row.age > memory) continue;
    const wait = pauseAfter(row.failures, rule) - row.age;
    if (wait > 0) {
      throw tooMany('Too many wrong passwords for this account.', {
        hint: `Wait ${inWords(wait)}, or set a new password by mail.`,
      });
    }
  }
}

/** Seconds an account rests after so many failures in a row: doubling from the first beyond the free ones. */
export function pauseAfter(
  failures: number,
  { free, firstPause }: { readonly free: number; readonly firstPause: number },
): number {
  return failures < free ? 0 : Math.min(longestPause, firstPause * 2 ** (failures - free));
}

/** Counts a wrong password. Must be committed although the request is refused: give it a manager of its own. */
export async function countGuess(manager: EntityManager, email: string, address: string): Promise<void> {
  await manager.query(
    `insert into password_guess (key, failures, last_at) select unnest($1::text[]), 1, now()
     on conflict (key) do update set last_at = now(), failures =
       case when password_guess.last_at < now() - make_interval(secs => $2) then 1
            else password_guess.failures + 1 end`,
    [keysOf(email, address), memory],
  );
}

/** Forgets the failures of an account from one address after the right password, and those long past. */
export async function forgetGuesses(manager: EntityManager, email: string, address: string): Promise<void> {
  await manager.query(
    `delete from password_guess where key = any($1) or last_at < now() - make_interval(secs => $2)`,
    [keysOf(email, address), memory],
  );
}
