import type { Me } from '@stillroom/shared/contracts';
import type { CellContent, NotebookContent } from '@stillroom/shared/document';
import { createNotebook } from '../../packages/server/src/modules/notebooks/index.ts';
import { signIn } from './build.ts';
import { type LiveAddress, LiveClient } from './live-client.ts';
import type { TestServer } from './server.ts';
import type { Visitor } from './visitor.ts';

export { cell } from './cells.ts';

/** A notebook with these cells in a group. @returns its id. */
export async function buildNotebook(
  server: TestServer,
  group: { readonly id: string },
  by: { readonly id: string },
  cells: readonly CellContent[] = [],
  about: Partial<NotebookContent> = {},
): Promise<string> {
  const content: NotebookContent = { title: 'Diacetyl rest', subject: 'none', ...about, cells };
  const { id } = await server.services.database.transaction((manager) =>
    createNotebook(manager, { group: group.id, by: by.id, content }),
  );
  return id;
}

/** Where a visitor's browser would open the live document. */
export function liveAddress(
  server: { readonly url: string },
  visitor: Visitor,
  notebook: string,
): LiveAddress {
  return {
    url: `${server.url.replace(/^http/u, 'ws')}/live`,
    notebook,
    headers: { cookie: visitor.cookie ?? '', origin: server.url },
  };
}

const open = new Set<LiveClient>();

/** Opens a notebook live, as that person; waits until the document is there. */
export async function openLive(server: TestServer, person: Me, notebook: string): Promise<LiveClient> {
  const client = connectLive(server, await signIn(server, person), notebook);
  await client.synced();
  return client;
}

/** Opens a notebook live with a session; may be refused. */
export function connectLive(
  server: { readonly url: string },
  visitor: Visitor,
  notebook: string,
): LiveClient {
  const client = new LiveClient(liveAddress(server, visitor, notebook));
  open.add(client);
  return client;
}

/** Closes every client that a test opened. */
export function closeLive(): void {
  for (const client of open) client.close();
  open.clear();
}
