import type { OperatorPerson } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';

interface Row {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly operator: boolean;
  readonly created_at: Date;
  readonly seen_at: Date | null;
  readonly groups: number;
}

/** Everybody with an account, by name. */
export async function listPeople(manager: EntityManager): Promise<OperatorPerson[]> {
  const rows: Row[] = await manager.query(
    `select p.id, p.name, p.email, p.operator, p.created_at, p.seen_at,
       (select count(*)::int from membership m where m.person = p.id) as groups
     from person p order by p.name, p.email`,
  );
  return rows.map(({ id, name, email, operator, created_at, seen_at, groups }) => ({
    id,
    name,
    email,
    operator,
    since: created_at.toISOString(),
    lastSeen: seen_at?.toISOString() ?? null,
    groups,
  }));
}
