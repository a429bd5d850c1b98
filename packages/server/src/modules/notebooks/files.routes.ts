import {
  contentOfFile,
  checkNotebookFile,
  notebookFileOf,
  writeNotebookFile,
} from '@stillroom/shared/notebook-file';
import { limits } from '@stillroom/shared/protocol';
import { type RequestHandler, Router } from 'express';
import * as z from 'zod/mini';
import { invalid } from '../../errors.ts';
import { authenticate } from '../../http/authenticate.ts';
import { route } from '../../http/route.ts';
import { uuid } from '../../http/validate.ts';
import type { Services } from '../../services.ts';
import { keepPicture, receivePicture, sendPicture } from '../files/index.ts';
import { loadGroup } from '../groups/index.ts';
import { createNotebook } from './commands/create-notebook.ts';
import { readContent } from './document.ts';
import { loadNotebook } from './load.ts';

const groupParams = z.object({ group: uuid });
const notebookParams = z.object({ notebook: uuid });
const pictureParams = z.object({
  notebook: uuid,
  digest: z.string().check(z.regex(/^[0-9a-f]{64}$/u, 'A picture is called by its digest.')),
});

/** Notebook files in and out, and pictures. */
export function filesRoutes(services: Services): Router {
  const router = Router();

  router.post(
    '/api/groups/:group/notebook-files',
    route(services, {
      limit: 'heavy',
      who: 'person',
      params: groupParams,
      body: z.unknown(),
      most: limits.notebookFile,
      status: 201,
      async handle({ person, params, body, manager }) {
        const { group } = await loadGroup(manager, person.id, params.group, 'notebook.create');
        const reading = checkNotebookFile(body);
        if (!reading.ok) throw invalid(reading.message, { hint: 'Nothing was made of it.' });
        const holder = { by: person.id, at: new Date().toISOString() };
        const content = contentOfFile(reading.file, holder);
        const named = { ...content, title: content.title || 'Untitled' };
        const { id } = await createNotebook(manager, { group: group.id, by: person.id, content: named });
        return { id };
      },
    }),
  );

  router.get(
    '/api/notebooks/:notebook/file',
    route(services, {
      limit: 'reading',
      who: 'person',
      params: notebookParams,
      async handle({ person, params, manager, response }) {
        const { notebook } = await loadNotebook(manager, person.id, params.notebook, 'notebook.export');
        const text = writeNotebookFile(notebookFileOf(await readContent(manager, notebook.id)));
        response
          .attachment(`${fileNameOf(notebook.title)}.stillroom.json`)
          .type('json')
          .send(text);
      },
    }),
  );

  router.post(
    '/api/notebooks/:notebook/pictures',
    refuseStrangers,
    receivePicture,
    route(services, {
      limit: 'heavy',
      who: 'person',
      params: notebookParams,
      status: 201,
      async handle({ person, params: { notebook }, manager, request }) {
        await loadNotebook(manager, person.id, notebook, 'notebook.edit');
        const { digest } = await keepPicture(manager, request.file?.buffer, notebook);
        return { digest, url: `/api/notebooks/${notebook}/pictures/${digest}` };
      },
    }),
  );

  // Reviewers and readers of public copies have no session. A picture's address is a digest of 256 bits that only the
  // pages which show it give away, so whoever has it may see it.
  router.get(
    '/api/notebooks/:notebook/pictures/:digest',
    route(services, {
      limit: 'reading',
      who: 'anyone',
      params: pictureParams,
      async handle({ params, manager, response }) {
        await sendPicture(manager, response, params.notebook, params.digest);
      },
    }),
  );

  return router;
}

/** Nobody's bytes are taken into memory before it is known whose they are. */
const refuseStrangers: RequestHandler = (request, _response, next) => {
  authenticate(request, 'person');
  next();
};

/** A title as the name of a file on any system. */
export const fileNameOf = (title: string): string =>
  title
    .normalize('NFC')
    .replace(/[^\p{L}\p{N} _-]+/gu, ' ')
    .replace(/\s+/gu, ' ')
    .trim()
    .slice(0, 80) || 'notebook';
