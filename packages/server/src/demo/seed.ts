import type { EntityManager } from 'typeorm';
import type { Services } from '../services.ts';
import { createPerson, type PersonEntity, readSettings, writeSetting } from '../modules/auth/index.ts';
import { createGroup, MembershipEntity, recordAudit } from '../modules/groups/index.ts';
import { createNotebook, writeRemark } from '../modules/notebooks/index.ts';
import { readDemoNotebook } from './notebook-files.ts';
import { demoGroups, demoPassword, demoPeople } from './people.ts';

type People = ReadonlyMap<string, PersonEntity>;

/**
 * Fills an empty installation with the demo, once and in one transaction.
 * @returns whether it did.
 */
export async function seedDemo({ database }: Services): Promise<boolean> {
  return database.transaction(async (manager) => {
    // Two servers that start at once take turns; the second finds the work done.
    await manager.query('select pg_advisory_xact_lock(7070003)');
    const { demo } = await readSettings(manager);
    const [{ count }] = (await manager.query('select count(*)::int as count from person')) as [
      { count: number },
    ];
    if (demo.length > 0 || count > 0) return false;
    const people = await seedPeople(manager);
    for (const group of demoGroups) await seedGroup(manager, people, group);
    await writeSetting(
      manager,
      'demo',
      demoPeople.flatMap(({ email, shownAs }) =>
        shownAs === undefined ? [] : { email, password: demoPassword, role: shownAs },
      ),
    );
    return true;
  });
}

async function seedPeople(manager: EntityManager): Promise<People> {
  const people = new Map<string, PersonEntity>();
  for (const { key, name, email, operator = false } of demoPeople) {
    const asked = { name, email, operator, password: demoPassword, confirmed: true };
    people.set(key, await createPerson(manager, asked));
  }
  return people;
}

async function seedGroup(
  manager: EntityManager,
  people: People,
  { name, members, notebook, remarks }: (typeof demoGroups)[number],
): Promise<void> {
  const [[leadKey] = ['']] = members;
  const lead = pick(people, leadKey);
  const group = await createGroup(manager, lead.id, name);
  for (const [key, role] of members.slice(1)) {
    const person = pick(people, key);
    await manager.insert(MembershipEntity, { group: group.id, person: person.id, role, notebooks: null });
    const words = `joined as ${role === 'author' ? 'an' : 'a'} ${role}`;
    await recordAudit(manager, { group: group.id, by: person.id, verb: 'member.joined', words });
  }
  const content = readDemoNotebook(notebook);
  const { id } = await createNotebook(manager, { group: group.id, by: lead.id, content });
  for (const { by, cell, quote, text } of remarks) {
    const on = content.cells.find((candidate) => candidate.name === cell);
    if (on === undefined) throw new Error(`The demo remarks on a cell ${cell} that is not there.`);
    await writeRemark(manager, id, { cell: on.id, quote, text }, { by: pick(people, by).id });
  }
}

function pick(people: People, key: string): PersonEntity {
  const person = people.get(key);
  if (person === undefined) throw new Error(`The demo has nobody called ${key}.`);
  return person;
}
