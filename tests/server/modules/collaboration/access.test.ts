import { describe, expect, test } from 'vitest';
import { Access, type RoleNow } from '../../../../packages/server/src/modules/collaboration/access.ts';

/** An access whose answers can be set, with a clock that stands still unless it is moved. */
function build() {
  const state = { role: 'author' as RoleNow, reads: 0, now: 0 };
  const access = new Access(
    async () => {
      state.reads += 1;
      return state.role;
    },
    () => state.now,
  );
  return { access, state };
}

describe('roles as they are now', () => {
  test('are read once while nothing changes', async () => {
    const { access, state } = build();
    for (let turn = 0; turn < 5; turn += 1) expect(await access.roleAt('ada', 'n')).toBe('author');
    expect(state.reads).toBe(1);
  });

  test('are read anew after news of a change', async () => {
    const { access, state } = build();
    await access.roleAt('ada', 'n');
    state.role = 'reader';
    access.forget({ person: 'ada' });
    expect(await access.roleAt('ada', 'n')).toBe('reader');
  });

  test('are read anew after a second, should news not come', async () => {
    const { access, state } = build();
    await access.roleAt('ada', 'n');
    state.role = null;
    state.now = 999;
    expect(await access.roleAt('ada', 'n')).toBe('author');
    state.now = 1000;
    expect(await access.roleAt('ada', 'n')).toBeNull();
  });

  test('of others are not touched by news of one', async () => {
    const { access, state } = build();
    await access.roleAt('ada', 'n');
    await access.roleAt('ben', 'n');
    access.forget({ person: 'ada' });
    await access.roleAt('ben', 'n');
    expect(state.reads).toBe(2);
    access.forget({ notebook: 'n' });
    await access.roleAt('ben', 'n');
    expect(state.reads).toBe(3);
  });

  test('read before a change and answered after it are not remembered', async () => {
    const answers: ((role: RoleNow) => void)[] = [];
    const access = new Access(() => new Promise((resolve) => answers.push(resolve)));
    const before = access.roleAt('ada', 'n');
    access.forget({ person: 'ada' });
    answers[0]?.('author');
    await before;
    const after = access.roleAt('ada', 'n');
    answers[1]?.('reader');
    expect(await after).toBe('reader');
  });
});
