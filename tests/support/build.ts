import type { Me } from '@stillroom/shared/contracts';
import type { GroupRole } from '@stillroom/shared/roles';
import { createPerson, presentMe } from '../../packages/server/src/modules/auth/index.ts';
import {
  createGroup,
  type GroupEntity,
  MembershipEntity,
} from '../../packages/server/src/modules/groups/index.ts';
import type { TestServer } from './server.ts';
import { Visitor } from './visitor.ts';

export const usualPassword = 'a usual password';

let count = 0;

interface PersonOptions {
  readonly email?: string;
  readonly name?: string;
  readonly operator?: boolean;
  readonly confirmed?: boolean;
}

/** A person with an account; what is not said is made up. */
export async function buildPerson(server: TestServer, options: PersonOptions = {}): Promise<Me> {
  count += 1;
  const {
    email = `person${count}@example.org`,
    name = `Person ${count}`,
    confirmed = true,
    operator = false,
  } = options;
  const { manager } = server.services.database;
  return presentMe(
    await createPerson(manager, { email, name, password: usualPassword, confirmed, operator }),
  );
}

/** A visitor signed in as that person. */
export async function signIn(server: TestServer, person: { readonly email: string }): Promise<Visitor> {
  const visitor = new Visitor(server.url);
  const { status, body } = await visitor.post('/api/session', {
    email: person.email,
    password: usualPassword,
  });
  if (status !== 200) throw new Error(`Signing in failed: ${JSON.stringify(body)}`);
  return visitor;
}

/** A group led by a person. */
export function buildGroup(
  server: TestServer,
  lead: { readonly id: string },
  name = 'Kinetics',
): Promise<GroupEntity> {
  return createGroup(server.services.database.manager, lead.id, name);
}

/** Puts a person into a group. */
export async function buildMember(
  server: TestServer,
  group: { readonly id: string },
  person: { readonly id: string },
  role: GroupRole,
  notebooks: string[] | null = null,
): Promise<void> {
  const { manager } = server.services.database;
  await manager.insert(MembershipEntity, { group: group.id, person: person.id, role, notebooks });
}
