import type { ShelfView } from '@stillroom/shared/contracts';
import { may } from '@stillroom/shared/roles';
import { Router } from 'express';
import { route } from '../../http/route.ts';
import type { ServerModule, Services } from '../../services.ts';
import type { RoomStore } from '../collaboration/index.ts';
import { lately, waitingFor } from './news.ts';
import { presentRows, shelvedNotebooks } from './rows.ts';

/** The Shelf: all notebooks of a person over all groups, the bin, what waits and what happened. */
export function createShelf(services: Services, rooms: RoomStore): ServerModule {
  const routes = Router();
  routes.get(
    '/api/shelf',
    route(services, {
      limit: 'reading',
      who: 'person',
      async handle({ person, manager }): Promise<ShelfView> {
        const all = await shelvedNotebooks(manager, person.id);
        const open = all.filter(({ deletedAt }) => deletedAt === null);
        const binned = all.filter(
          ({ deletedAt, role }) => deletedAt !== null && may(role, 'notebook.restore'),
        );
        const [notebooks, bin, waiting, news] = await Promise.all([
          presentRows(manager, rooms, open),
          presentRows(manager, rooms, binned),
          waitingFor(manager, person.id, open),
          lately(manager, person.id, open),
        ]);
        return { notebooks, bin, waiting, lately: news };
      },
    }),
  );
  return { routes };
}
