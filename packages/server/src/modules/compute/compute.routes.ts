import { trialRequest, type TrialView } from '@stillroom/shared/contracts';
import { Router, type Response } from 'express';
import type { EntityManager } from 'typeorm';
import * as z from 'zod/mini';
import { notFound } from '../../errors.ts';
import { route } from '../../http/route.ts';
import { token, uuid } from '../../http/validate.ts';
import type { Services } from '../../services.ts';
import { GroupEntity } from '../groups/index.ts';
import { loadNotebook, loadPublicNotebook, type NotebookEntity } from '../notebooks/index.ts';
import { fairCopyText, withResult } from './fair-copy.ts';
import type { Planner } from './planner.ts';
import type { ResultStore } from './results.ts';
import type { Trials } from './trials.ts';

const notebookParams = z.object({ notebook: uuid });
const cellParams = z.object({ notebook: uuid, cell: z.string().check(z.maxLength(100)) });
const resultParams = z.object({
  notebook: uuid,
  digest: z.string().check(z.regex(/^sha256:[0-9a-f]{64}$/u, 'A digest looks like sha256:….')),
});
const waits = { message: 'It waits for a cell it draws on to be computed.' };
const givenUp = { message: 'This trial was given up for another.' };
const publicParams = z.object({ token });

export interface ComputeRoutes {
  readonly results: ResultStore;
  readonly trials: Trials;
  /** Works with the planner of a notebook, opening it where it is not open. */
  withPlanner<T>(notebook: string, work: (planner: Planner) => Promise<T>): Promise<T>;
}

/** Results, fair copies, and what may be asked of the engine. */
export function computeRoutes(services: Services, { results, withPlanner, trials }: ComputeRoutes): Router {
  const router = Router();

  const sendFairCopy = async (response: Response, manager: EntityManager, notebook: NotebookEntity) => {
    const group = await manager.findOneByOrFail(GroupEntity, { id: notebook.group });
    const about = { id: notebook.id, groupName: group.name, at: new Date() };
    const text = await withPlanner(notebook.id, (planner) => fairCopyText(manager, results, planner, about));
    response.type('json').send(text);
  };

  router.get(
    '/api/notebooks/:notebook/fair-copy',
    route(services, {
      limit: 'reading',
      who: 'person',
      params: notebookParams,
      async handle({ person, params, manager, response }) {
        const { notebook } = await loadNotebook(manager, person.id, params.notebook, 'notebook.read');
        await sendFairCopy(response, manager, notebook);
      },
    }),
  );

  router.get(
    '/api/public/:token',
    route(services, {
      limit: 'reading',
      who: 'anyone',
      params: publicParams,
      async handle({ params, manager, response }) {
        await sendFairCopy(response, manager, await loadPublicNotebook(manager, params.token));
      },
    }),
  );

  router.get(
    '/api/notebooks/:notebook/results/:digest',
    route(services, {
      limit: 'reading',
      who: 'person',
      params: resultParams,
      async handle({ person, params: { notebook, digest }, manager, response }) {
        await loadNotebook(manager, person.id, notebook, 'notebook.read');
        const shown = await withPlanner(notebook, async (planner) => {
          await planner.settled();
          return planner.shows(digest);
        });
        const known = shown ? (await results.find([digest])).get(digest) : undefined;
        const text = known?.status === 'ok' ? (known.json ?? (await results.text(digest))) : null;
        if (known?.status !== 'ok' || text === null) throw notFound('result');
        const { kind, resultDigest, warnings, took, kept } = known;
        if (kept) response.set('Cache-Control', 'private, max-age=31536000, immutable');
        response.type('json').send(withResult({ digest, kind, resultDigest, warnings, took }, text));
      },
    }),
  );

  router.post(
    '/api/notebooks/:notebook/cells/:cell/run',
    route(services, {
      limit: 'running',
      who: 'person',
      params: cellParams,
      status: 202,
      transaction: false,
      async handle({ person, params: { notebook, cell }, manager }) {
        await loadNotebook(manager, person.id, notebook, 'notebook.run');
        await withPlanner(notebook, (planner) => planner.bringUpToDate([cell]));
      },
    }),
  );

  router.post(
    '/api/notebooks/:notebook/run',
    route(services, {
      limit: 'running',
      who: 'person',
      params: notebookParams,
      status: 202,
      transaction: false,
      async handle({ person, params: { notebook }, manager }) {
        await loadNotebook(manager, person.id, notebook, 'notebook.run');
        await withPlanner(notebook, (planner) => planner.bringUpToDate(null));
      },
    }),
  );

  router.post(
    '/api/notebooks/:notebook/cells/:cell/stop',
    route(services, {
      limit: 'running',
      who: 'person',
      params: cellParams,
      status: 202,
      transaction: false,
      async handle({ person, params: { notebook, cell }, manager }) {
        await loadNotebook(manager, person.id, notebook, 'notebook.run');
        await withPlanner(notebook, (planner) => planner.stop(cell));
      },
    }),
  );

  router.post(
    '/api/notebooks/:notebook/cells/:cell/trial',
    route(services, {
      limit: 'trying',
      who: 'person',
      params: cellParams,
      body: trialRequest,
      transaction: false,
      async handle({ person, params: { notebook, cell }, body, manager, response }): Promise<TrialView> {
        await loadNotebook(manager, person.id, notebook, 'notebook.run');
        const left = new AbortController();
        response.on('close', () => left.abort());
        const { preparation, owner } = await withPlanner(notebook, (planner) => planner.trial(cell, body));
        if (preparation.state === 'blocked') return { status: 'failed', error: preparation.error };
        if (preparation.state === 'waiting') return { status: 'failed', error: waits };
        const known = await trials.run(preparation.job, owner, left.signal);
        if (known === null) return { status: 'failed', error: givenUp };
        if (known.status === 'failed') return { status: 'failed', error: known.error };
        const text = known.json ?? (await results.text(known.digest));
        if (text === null) throw notFound('result');
        return { status: 'ok', result: JSON.parse(text) as unknown, warnings: known.warnings };
      },
    }),
  );

  return router;
}
