import { setTimeout as pause } from 'node:timers/promises';
import { publicAddress } from '../config/index.ts';
import { describeError } from '../logger.ts';
import { readSettings, writeSetting } from '../modules/auth/index.ts';
import type { Compute } from '../modules/compute/index.ts';
import { NotebookEntity } from '../modules/notebooks/index.ts';
import { awaitStanding, freezeNotebook, readFreeze } from '../modules/records/index.ts';
import { inviteReviewer } from '../modules/reviews/index.ts';
import type { Services } from '../services.ts';
import { readDemoNotebook } from './notebook-files.ts';
import { demoReview } from './people.ts';

const dayLength = 24 * 3_600_000;
const lookEvery = 250;

/**
 * Freezes one notebook of the demo and invites a reviewer, in one transaction, once its cells are computed. What goes
 * wrong is logged and tried again at the next start: the application is of use without it.
 */
export async function seedReview(services: Services, compute: Compute, signal: AbortSignal): Promise<void> {
  const { database, log } = services;
  try {
    const settings = await readSettings(database.manager);
    if (settings.demo.length === 0 || settings.demoReview !== null) return;
    const { title } = readDemoNotebook(demoReview.notebook);
    const notebook = await database.manager.findOneBy(NotebookEntity, { title });
    if (notebook === null || !(await isComputed(services, compute, notebook, signal))) return;
    await freezeAndInvite(services, compute, notebook);
    log.info('A record of the demo was frozen and is under review.');
  } catch (error) {
    if (!signal.aborted) log.warn('The record of the demo could not be frozen.', describeError(error));
  }
}

/** Waits until no cell of the notebook works any more; false when told to stop. */
async function isComputed(
  { database }: Services,
  compute: Compute,
  notebook: NotebookEntity,
  signal: AbortSignal,
): Promise<boolean> {
  while (!signal.aborted) {
    const { working } = await readFreeze(database.manager, compute, notebook);
    if (working === 0) return true;
    await pause(lookEvery, undefined, { signal }).catch(() => undefined);
  }
  return false;
}

async function freezeAndInvite(
  services: Services,
  compute: Compute,
  notebook: NotebookEntity,
): Promise<void> {
  const standing = await awaitStanding(compute, notebook.id);
  await services.database.transaction(async (manager) => {
    const { reasons, reviewer, days } = demoReview;
    const record = await freezeNotebook(manager, compute, notebook, standing, notebook.createdBy, reasons);
    const until = new Date(Date.now() + days * dayLength).toISOString().slice(0, 10);
    const address = publicAddress(services.config);
    const invitation = { ...reviewer, until };
    const { token } = await inviteReviewer(manager, address, notebook.createdBy, record, invitation);
    await writeSetting(manager, 'demoReview', `/review/${token}`);
  });
}
