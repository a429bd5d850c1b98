import { describe, expect, test } from 'vitest';
import { guessRules, pauseAfter } from '../../../../packages/server/src/modules/auth/guesses.ts';
import { isPassword, hashPassword } from '../../../../packages/server/src/modules/auth/passwords.ts';

describe('the pause after wrong passwords', () => {
  test('is none at first, then doubles, up to a quarter of an hour', () => {
    const [here] = guessRules;
    const pauses = [0, 4, 5, 6, 7, 8, 30].map((failures) => pauseAfter(failures, here));
    expect(pauses).toEqual([0, 0, 15, 30, 60, 120, 900]);
  });
});

describe('passwords', () => {
  test('are kept as argon2id with at least 19 MiB (OWASP)', async () => {
    const hash = await hashPassword('a long password');
    expect(hash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/u);
    expect(await isPassword(hash, 'a long password')).toBe(true);
    expect(await isPassword(hash, 'a long passwore')).toBe(false);
  });

  test('are the same however the keyboard composed an accent', async () => {
    const hash = await hashPassword('caf\u00e9 at noon');
    expect(await isPassword(hash, 'cafe\u0301 at noon')).toBe(true);
  });

  test('nobody has the decoy that stands in for a missing account', async () => {
    expect(await isPassword(null, 'a password that nobody has')).toBe(false);
  });
});
