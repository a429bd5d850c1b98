import type { EntityManager } from 'typeorm';
import { In } from 'typeorm';
import { PersonEntity } from './entities/person.ts';

/** The person of that id, or null. */
export function findPerson(manager: EntityManager, id: string): Promise<PersonEntity | null> {
  return manager.findOneBy(PersonEntity, { id });
}

/** The person with that address (lower case), or null. */
export function findPersonByEmail(manager: EntityManager, email: string): Promise<PersonEntity | null> {
  return manager.findOneBy(PersonEntity, { email });
}

/** The people of these ids, by id. */
export async function findPeople(
  manager: EntityManager,
  ids: Iterable<string>,
): Promise<ReadonlyMap<string, PersonEntity>> {
  const people = await manager.findBy(PersonEntity, { id: In([...new Set(ids)]) });
  return new Map(people.map((person) => [person.id, person]));
}
