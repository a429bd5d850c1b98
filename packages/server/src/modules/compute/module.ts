import { randomUUID } from 'node:crypto';
import { availableParallelism } from 'node:os';
import type { CellJob } from '@stillroom/shared/cells';
import type { TaskList } from 'graphile-worker';
import { openConnections } from '../../database/connections.ts';
import { describeError } from '../../logger.ts';
import type { ServerModule, Services } from '../../services.ts';
import type { Room, RoomStore } from '../collaboration/index.ts';
import { keepFace, keepStates, readGroup, readStates, workingNotebooks } from '../notebooks/index.ts';
import { computeRoutes } from './compute.routes.ts';
import { Demand } from './demand.ts';
import { Planner } from './planner.ts';
import type { Pool } from './pool/index.ts';
import { type RunOwner, RunQueue } from './queue.ts';
import { ResultStore } from './results.ts';
import { takeOutOldResults } from './retention.ts';
import { Runner } from './runner.ts';
import type { NotebookFile } from './state-keeper.ts';
import { Trials } from './trials.ts';

export interface Compute extends ServerModule {
  readonly results: ResultStore;
  /** Null in a process that does not compute. */
  readonly pool: Pool | null;
  /** To be called with each room that opens. */
  opened(room: Room): void;
  /** Works with the planner of a notebook, opening it where it is not open. */
  withPlanner<T>(notebook: string, work: (planner: Planner) => Promise<T>): Promise<T>;
}

export interface ComputeOptions {
  /** The rooms, which are made after this module. */
  readonly rooms: () => RoomStore;
  readonly createPool: (size: number) => Pool;
  /** Tasks of later modules that need the pool, by name; `host` is this process by the name of its connections. */
  readonly tasks?: (pool: Pool, host: string) => TaskList;
}

/** How often old results are taken out, in milliseconds. */
const retentionEvery = 6 * 3_600_000;

/** Two at least: one stays free for what is answered at once. */
const poolSize = (asked: number | undefined): number => Math.max(2, asked ?? availableParallelism());

/** Planning, running and keeping: what makes the cells of open notebooks current. */
export function createCompute(services: Services, options: ComputeOptions): Compute {
  const { config, events, log } = services;
  const failed = (words: string, error: unknown) => log.error(words, describeError(error));
  const host = `stillroom engine ${randomUUID()}`;
  const connections = openConnections(config.DATABASE_URL, log, { name: host, most: 10, durable: false });
  const results = new ResultStore(connections);
  const queue = new RunQueue(connections);
  const demand = new Demand((digest) => {
    queue.end(digest, 'unwanted').catch((error: unknown) => failed('A run could not be ended.', error));
  });
  const file: NotebookFile = {
    read: async (notebook) => ({
      group: await readGroup(connections, notebook),
      states: await readStates(connections, notebook),
    }),
    async write(notebook, content, states) {
      await keepStates(connections, notebook, states);
      await keepFace(connections, notebook, content);
    },
  };

  const submit = async (job: CellJob, owner: RunOwner): Promise<void> => {
    if (runner?.take(job, owner) !== true) await queue.submit(job, owner);
  };

  const trials = new Trials({ results, demand, submit });
  const planners = new Map<string, Planner>();
  const opened = (room: Room): void => {
    const planner = new Planner({ room, results, queue, demand, file, failed, submit });
    planners.set(room.notebook, planner);
    room.observe(planner);
    room.observe({
      closed() {
        if (planners.get(room.notebook) === planner) planners.delete(room.notebook);
      },
    });
    planner.replan();
  };
  const resultChanged = (digest: string): void => {
    for (const planner of planners.values()) planner.resultChanged(digest);
    trials.resultChanged(digest);
  };
  const withPlanner: Compute['withPlanner'] = (notebook, work) =>
    options.rooms().use(notebook, () => {
      const planner = planners.get(notebook);
      if (planner === undefined) throw new Error(`Notebook ${notebook} is open and has no planner.`);
      return work(planner);
    });
  const bringToLife = (notebook: string): void => {
    withPlanner(notebook, async (planner) => planner.run()).catch((error: unknown) =>
      failed('A notebook could not be computed.', error),
    );
  };

  const size = poolSize(config.COMPUTE_WORKERS);
  const pool = config.PROCESS === 'server' ? null : options.createPool(size);
  const runner =
    pool === null
      ? null
      : new Runner({
          connections,
          host,
          pool,
          size,
          queue,
          results,
          log,
          told: (digest) => resultChanged(digest),
          tasks: options.tasks ?? (() => ({})),
        });

  const listeners = [
    events.on('result.changed', ({ digest }) => {
      results.doubt(digest);
      resultChanged(digest);
    }),
    events.on('run.moved', ({ digest, ...run }) => {
      for (const planner of planners.values()) planner.runMoved(digest, run);
    }),
    events.on('run.ending', ({ digest, by }) => runner?.end(digest, by)),
    events.on('notebook.created', ({ notebook }) => {
      if (config.PROCESS !== 'worker') bringToLife(notebook);
    }),
    events.onGap(() => {
      results.doubtAll();
      for (const planner of planners.values()) planner.afterGap();
    }),
  ];

  let retention: NodeJS.Timeout | null = null;
  return {
    results,
    pool,
    opened,
    withPlanner,
    routes: computeRoutes(services, { results, withPlanner, trials }),
    async start() {
      await runner?.start();
      // Runs that were under way when the last process ended are taken up again.
      if (config.PROCESS !== 'worker') (await workingNotebooks(connections)).forEach(bringToLife);
      retention = setInterval(() => {
        takeOutOldResults(connections).catch((error: unknown) =>
          failed('Old results could not be taken out.', error),
        );
      }, retentionEvery).unref();
    },
    async stop() {
      if (retention !== null) clearInterval(retention);
      for (const unlisten of listeners) unlisten();
      demand.stop();
      await runner?.stop();
      await pool?.close();
      await connections.end();
    },
  };
}
