import type { FreezeView } from '@stillroom/shared/contracts';
import { engineVersion } from '@stillroom/shared/plan';
import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { conflict, invalid } from '../../../errors.ts';
import { findPerson } from '../../auth/index.ts';
import type { Compute, StandingCell } from '../../compute/index.ts';
import { picturesAt, placePicture } from '../../files/index.ts';
import { GroupEntity, recordAudit } from '../../groups/index.ts';
import { type NotebookEntity, readAuthors, remarksOf } from '../../notebooks/index.ts';
import { freezeView, type OpenRemark } from '../checks.ts';
import { type RecordCell, type RecordContent, recordFormat, sealContent } from '../content.ts';
import { RecordEntity } from '../entities/record.ts';
import { storableText } from '../../../database/storable.ts';

/** How long freezing waits for working cells, in milliseconds, and how often it looks. */
const patience = 90_000;
const looking = 100;

type Standing = Awaited<ReturnType<Parameters<Parameters<Compute['withPlanner']>[1]>[0]['standing']>>;

/** The check before freezing, as things stand. */
export async function readFreeze(
  manager: EntityManager,
  compute: Compute,
  notebook: NotebookEntity,
): Promise<FreezeView> {
  const { cells } = await compute.withPlanner(notebook.id, (planner) => planner.standing());
  const remarks = await openRemarks(manager, notebook.id);
  return freezeView(cells, remarks, await nextNumber(manager, notebook.group));
}

/**
 * Freezes a notebook, as its cells stood, as the group's next record, in the manager's transaction.
 * @throws conflict where cells are stale or failed; invalid where a reason is missing.
 */
export async function freezeNotebook(
  manager: EntityManager,
  compute: Compute,
  notebook: NotebookEntity,
  standing: Standing,
  by: string,
  reasons: Readonly<Record<string, string>>,
): Promise<RecordEntity> {
  const remarks = await openRemarks(manager, notebook.id);
  const given = acceptReasons(freezeView(standing.cells, remarks, 0), reasons);
  const group = await lockGroup(manager, notebook.group);
  const number = await nextNumber(manager, group.id);
  const frozenAt = new Date();
  const content: RecordContent = {
    format: recordFormat,
    group: { id: group.id, name: group.name },
    number,
    notebook: notebook.id,
    title: standing.content.title,
    subject: standing.content.subject,
    authors: await readAuthors(manager, notebook.id),
    frozenAt: frozenAt.toISOString(),
    frozenBy: (await findPerson(manager, by))?.name ?? '',
    engine: engineVersion,
    reasons: given,
    cells: await Promise.all(standing.cells.map((cell) => freezeCell(compute, cell))),
  };
  const { text, digest } = sealContent(content);
  const title = storableText(content.title);
  const record = await manager.save(
    manager.create(RecordEntity, {
      group: group.id,
      number,
      notebook: notebook.id,
      title,
      frozenAt,
      frozenBy: by,
      digest,
      content: text,
    }),
  );
  for (const picture of await picturesAt(manager, notebook.id))
    await placePicture(manager, picture, record.id);
  const words = `froze “${title}” as record No. ${number}`;
  await recordAudit(manager, { group: group.id, by, verb: 'record.frozen', words });
  await announce(manager, 'records.changed', { notebook: notebook.id });
  return record;
}

/**
 * The cells once none is working any more. To be asked before a transaction begins: none may stay open so long.
 * @throws conflict where they do not come to an end.
 */
export async function awaitStanding(compute: Compute, notebook: string): Promise<Standing> {
  const until = Date.now() + patience;
  return compute.withPlanner(notebook, async (planner) => {
    for (;;) {
      const standing = await planner.standing();
      if (!planner.busy) return standing;
      if (Date.now() > until) {
        throw conflict('Cells of this notebook are still working.', {
          hint: 'Wait until they are done, or stop them, then freeze again.',
        });
      }
      await new Promise((resolve) => setTimeout(resolve, looking));
    }
  });
}

/** The reasons that are printed: one for each check that stays open, and no others. */
function acceptReasons(
  { checks }: FreezeView,
  reasons: Readonly<Record<string, string>>,
): Record<string, string> {
  const blocking = checks.filter(({ state }) => state === 'blocking');
  if (blocking.length > 0) {
    const cells = blocking.flatMap((check) => check.cells);
    const names = cells.map(({ name, why }) => (name === '' ? why : `${name}: ${why}`)).join(' ');
    throw conflict(`This notebook cannot be frozen yet. ${names}`, {
      hint: 'Bring these cells up to date, repair them or take them out.',
    });
  }
  const given: Record<string, string> = {};
  const fields: Record<string, string> = {};
  for (const { id, words, state } of checks) {
    if (state !== 'open') continue;
    const reason = reasons[id]?.trim() ?? '';
    if (reason === '') fields[id] = `“${words}” is not so: say why it may stay open.`;
    given[id] = reason;
  }
  const [first] = Object.values(fields);
  if (first !== undefined) throw invalid(first, { fields });
  return given;
}

async function freezeCell(compute: Compute, { content, planned, known }: StandingCell): Promise<RecordCell> {
  if (known?.status !== 'ok') throw new Error(`Cell ${content.id} has no result to freeze.`);
  const text = known.json ?? (await compute.results.text(known.digest));
  if (text === null) throw new Error(`The result of cell ${content.id} is gone.`);
  return {
    id: content.id,
    kind: content.kind,
    name: content.name,
    text: content.text,
    settings: content.settings,
    draws: planned.draws,
    state: content.held === null ? 'current' : 'held',
    digest: known.digest,
    resultDigest: known.resultDigest,
    result: JSON.parse(text) as unknown,
    error: null,
    warnings: known.warnings,
  };
}

async function openRemarks(manager: EntityManager, notebook: string): Promise<OpenRemark[]> {
  return (await remarksOf(manager, notebook)).filter(({ settledAt }) => settledAt === null);
}

/** The group, locked, so that two records frozen at once get two numbers. */
function lockGroup(manager: EntityManager, id: string): Promise<GroupEntity> {
  return manager.findOneOrFail(GroupEntity, { where: { id }, lock: { mode: 'pessimistic_write' } });
}

async function nextNumber(manager: EntityManager, group: string): Promise<number> {
  return ((await manager.maximum(RecordEntity, 'number', { group })) ?? 0) + 1;
}
