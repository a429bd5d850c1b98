import { describe, expect, test } from 'vitest';
import {
  Access,
  type Place,
  type RoleNow,
} from '../../../../packages/server/src/modules/collaboration/access.ts';

/** An access whose reads are answered by hand. */
function build() {
  const reads: {
    places: readonly Place[];
    answer: (...roles: RoleNow[]) => void;
    fail: (error: Error) => void;
  }[] = [];
  const access = new Access(
    (places) =>
      new Promise((resolve, reject) =>
        reads.push({ places, answer: (...roles) => resolve(roles), fail: reject }),
      ),
  );
  return { access, reads };
}
const turn = () => new Promise<void>((resolve) => setImmediate(resolve));

describe('roles as they are now', () => {
  test('are read for everybody who asks at once in one statement', async () => {
    const { access, reads } = build();
    const asked = [access.roleAt('ada', 'n'), access.roleAt('ben', 'n'), access.roleAt('ada', 'n')];
    await turn();
    expect(reads.map(({ places }) => places.map(({ person }) => person))).toEqual([['ada', 'ben']]);
    reads[0]?.answer('lead', 'reader');
    expect(await Promise.all(asked)).toEqual(['lead', 'reader', 'lead']);
  });

  test('never come from a read that began before they were asked for', async () => {
    const { access, reads } = build();
    const before = access.roleAt('ada', 'n');
    await turn();
    const after = access.roleAt('ada', 'n');
    reads[0]?.answer('author');
    expect(await before).toBe('author');
    await turn();
    reads[1]?.answer('reader');
    expect(await after).toBe('reader');
  });

  test('are remembered by nobody', async () => {
    const { access, reads } = build();
    for (const role of ['author', 'reader', null] as const) {
      const asked = access.roleAt('ada', 'n');
      await turn();
      reads.at(-1)?.answer(role);
      expect(await asked).toBe(role);
    }
    expect(reads).toHaveLength(3);
  });

  test('that cannot be read fail whoever asked, and the next may ask again', async () => {
    const { access, reads } = build();
    const asked = access.roleAt('ada', 'n');
    await turn();
    reads[0]?.fail(new Error('no database'));
    await expect(asked).rejects.toThrow('no database');
    const again = access.roleAt('ada', 'n');
    await turn();
    reads[1]?.answer('author');
    expect(await again).toBe('author');
  });
});
