import { chmodSync, cpSync, mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { EngineProcess, findIsolation } from '@stillroom/kernel/worker';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { jobOf } from '../../support/cell-jobs.ts';
import { engineFolder } from '../../support/engine.ts';

const memory = 900 * 1024 * 1024;
let folder = '';
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'stillroom-isolation-'));
  chmodSync(folder, 0o755);
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

// Only root lends its processes an account that may not read what is its own.
test.runIf(process.getuid?.() === 0)(
  'an engine in a closed home is copied to where its account can read it',
  async () => {
    const closed = join(folder, 'closed');
    const state = join(folder, 'state');
    mkdirSync(closed, { mode: 0o700 });
    cpSync(engineFolder, join(closed, 'engine'), { recursive: true });
    for (let round = 0; round < 2; round++) {
      const { command, words } = await findIsolation({
        folder: join(closed, 'engine'),
        stateFolder: state,
        memory,
      });
      expect(command.args.at(-1)).toContain(state);
      expect(words).toContain('an account without rights');
      const engine = await EngineProcess.start(command);
      expect(await engine.run(jobOf('claim', '1 == 1'), { deadline: 20 })).toMatchObject({ status: 'ok' });
      engine.kill();
      await engine.gone;
    }
  },
);

test('an engine that is not there is missed in words', async () => {
  await expect(findIsolation({ folder: join(folder, 'none'), memory })).rejects.toThrow('has not been built');
});

test('what holds is said in one sentence', async () => {
  const { words } = await findIsolation({ folder: engineFolder, memory });
  expect(words).toMatch(/^[A-Z].*no files, no other programs.*\.$/u);
});
