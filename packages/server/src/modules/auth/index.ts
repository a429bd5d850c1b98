import { AccountTokenEntity } from './entities/account-token.ts';
import { PersonEntity } from './entities/person.ts';

export { createAuth } from './module.ts';
export type { AuthModule, Caller } from './module.ts';
export { createPerson } from './commands/create-person.ts';
export { makeOperator } from './commands/make-operator.ts';
export { PersonEntity } from './entities/person.ts';
export { findPeople, findPerson, findPersonByEmail } from './people.ts';
export { presentMe, presentPerson } from './person.presenter.ts';
export { digestOf, newToken } from './secrets.ts';
export { readSettings, writeSetting } from './settings.ts';
export type { InstallationSettings } from './settings.ts';
export const authEntities = [PersonEntity, AccountTokenEntity];
