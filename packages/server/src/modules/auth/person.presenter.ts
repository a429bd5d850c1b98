import type { Me, Person } from '@stillroom/shared/contracts';
import type { PersonEntity } from './entities/person.ts';

/** First letters of the first and the last word of a name. */
export function initialsOf(name: string): string {
  const words = name.split(/\s+/u).filter((word) => word !== '');
  const picked = words.length > 1 ? [words[0], words.at(-1)] : words;
  return picked.map((word) => [...(word ?? '')][0]?.toLocaleUpperCase('en') ?? '').join('');
}

/** A person as others see them. */
export function presentPerson(person: Pick<PersonEntity, 'id' | 'name' | 'hue'>): Person {
  return { id: person.id, name: person.name, initials: initialsOf(person.name), hue: person.hue };
}

/** A person as they see themselves. */
export function presentMe(person: PersonEntity): Me {
  return { ...presentPerson(person), email: person.email, operator: person.operator };
}
