import type { SessionView } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';

/** What the operator changes while the installation runs; kept in the database. */
export interface InstallationSettings {
  readonly signUp: SessionView['signUp'];
  /** Seeded accounts of a demo installation. */
  readonly demo: SessionView['demo'];
  /** Path of the seeded reviewer's link. */
  readonly demoReview: string | null;
}

const usual: InstallationSettings = { signUp: 'invitation', demo: [], demoReview: null };

/** All settings, with the usual value where none was chosen. */
export async function readSettings(manager: EntityManager): Promise<InstallationSettings> {
  const rows: { name: string; value: unknown }[] = await manager.query('select name, value from setting');
  return { ...usual, ...Object.fromEntries(rows.map(({ name, value }) => [name, value])) };
}

/** Sets one setting. */
export async function writeSetting<Name extends keyof InstallationSettings>(
  manager: EntityManager,
  name: Name,
  value: InstallationSettings[Name],
): Promise<void> {
  await manager.query(
    'insert into setting values ($1, $2::jsonb) on conflict (name) do update set value = excluded.value',
    [name, JSON.stringify(value)],
  );
}
