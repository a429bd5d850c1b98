import { abilities, abilitiesOf, groupRoles, may, roleAt } from '@stillroom/shared/roles';
import { describe, expect, test } from 'vitest';

describe('the permission table', () => {
  test('a stronger role may do all that a weaker one may', () => {
    const weaker = groupRoles.slice(1);
    weaker.forEach((role, index) => {
      const stronger = groupRoles[index]!;
      expect(abilitiesOf(role).filter((ability) => !may(stronger, ability))).toEqual([]);
    });
  });

  test('every ability belongs to somebody', () => {
    const standings = [...groupRoles, 'reviewer', 'operator', 'public'] as const;
    expect(abilities.filter((ability) => !standings.some((standing) => may(standing, ability)))).toEqual([]);
  });

  test('nobody may do nothing', () => {
    expect(abilities.filter((ability) => may(null, ability))).toEqual([]);
  });

  test('a reader, a reviewer and the public may write nowhere in a notebook', () => {
    for (const standing of ['reader', 'reviewer', 'public', 'operator'] as const) {
      expect(may(standing, 'notebook.edit')).toBe(false);
      expect(may(standing, 'notebook.run')).toBe(false);
      expect(may(standing, 'notebook.freeze')).toBe(false);
    }
  });

  test('a role limited to chosen notebooks counts at those alone', () => {
    const membership = { role: 'author', notebooks: ['a'] } as const;
    expect(roleAt(membership, 'a')).toBe('author');
    expect(roleAt(membership, 'b')).toBe(null);
    expect(roleAt({ role: 'author', notebooks: null }, 'b')).toBe('author');
    expect(roleAt(null, 'a')).toBe(null);
  });
});
