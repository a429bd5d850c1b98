import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { sessionName } from '../session.ts';

interface SessionRow {
  readonly sid: string;
  readonly browser: string | null;
  readonly begun: string | null;
  readonly seen: string | null;
}

/** The sessions of a person that have not run out, newest use first. */
export function sessionsOf(manager: EntityManager, person: string): Promise<SessionRow[]> {
  return manager.query(
    `select sid, sess ->> 'browser' as browser, sess ->> 'begun' as begun, sess ->> 'seen' as seen
     from session where sess #>> '{passport,user}' = $1 and expire > now()
     order by sess ->> 'seen' desc`,
    [person],
  );
}

/** Ends all sessions of a person but one; open sockets hear of it. */
export async function endSessions(
  manager: EntityManager,
  person: string,
  except: string | null,
): Promise<void> {
  await manager.query(
    `delete from session where sess #>> '{passport,user}' = $1 and sid is distinct from $2`,
    [person, except],
  );
  await announce(manager, 'session.ended', {
    person,
    session: null,
    except: except === null ? null : sessionName(except),
  });
}

/** Ends one session of a person by its name in the list. @returns whether there was one. */
export async function endSession(manager: EntityManager, person: string, name: string): Promise<boolean> {
  const sessions = await sessionsOf(manager, person);
  const found = sessions.find(({ sid }) => sessionName(sid) === name);
  if (found === undefined) return false;
  await manager.query('delete from session where sid = $1', [found.sid]);
  await announce(manager, 'session.ended', { person, session: name, except: null });
  return true;
}
