import { readFileSync, writeFileSync } from 'node:fs';
import { pathToFileURL } from 'node:url';
import { evaluateCell } from '@stillroom/kernel/engine';
import { loadScriptEngine } from '@stillroom/kernel/script';
import { readNotebookFile } from '@stillroom/shared/notebook-file';
import {
  engineVersion,
  type KnownOutcome,
  type PlannableCell,
  planNotebook,
  prepareJob,
} from '@stillroom/shared/plan';
import { expect, test } from 'vitest';
import { engineFolder } from '../support/engine.ts';
import { referenceNetworks, referenceRows } from '../support/reference-networks.ts';

/*
 * The bytes of results belong to the version of the engine. result-digests.json holds, for the present version, the digest
 * and the result digest of every cell of some fixed notebooks: one of our own with every kind, those of the demo, and the
 * structures of the reference networks.
 */

const digestsFile = new URL('./result-digests.json', import.meta.url);
interface Written {
  readonly engine: string;
  /** Digest of the cell and of its result, by notebook and cell. */
  readonly results: Readonly<Record<string, readonly [string, string]>>;
}

const howToRaise =
  'Results have changed under one version of the engine. Raise `engineVersion` in ' +
  'packages/shared/src/plan/engine-version.ts, then write the new results down: ' +
  'WRITE_RESULT_DIGESTS=1 npx vitest run tests/reference/engine-version.test.ts';

function cellsOf(path: string): readonly PlannableCell[] {
  const read = readNotebookFile(readFileSync(new URL(path, import.meta.url), 'utf8'));
  if (!read.ok) throw new Error(`${path}: ${read.message}`);
  return read.file.cells;
}

const demo = (name: string) => cellsOf(`../../packages/server/src/demo/notebooks/${name}.stillroom.json`);

const references = (): PlannableCell[] =>
  referenceNetworks.flatMap((entry, index) => {
    const text = referenceRows(entry).join('\n');
    return [
      { id: `n${index}`, kind: 'network', name: `n${index}`, text, settings: {} },
      { id: entry.id, kind: 'structure', name: `s${index}`, text: '', settings: { network: `n${index}` } },
    ];
  });

/** Digest and result digest of every cell; a cell that fails stands with its message. */
async function compute(cells: readonly PlannableCell[]): Promise<Map<string, readonly [string, string]>> {
  const folder = pathToFileURL(`${engineFolder}/`);
  const wasm = readFileSync(new URL('quickjs.wasm', folder));
  const snapshot = readFileSync(new URL('script-memory.bin', folder));
  const scripts = await loadScriptEngine(new Uint8Array(wasm), snapshot);
  const plan = planNotebook(cells);
  const outcomes = new Map<string, KnownOutcome>();
  const results = new Map<string, readonly [string, string]>();
  for (const id of plan.order) {
    const preparation = prepareJob(plan, id, (drawn) => outcomes.get(drawn));
    if (preparation.state !== 'ready')
      throw new Error(`${id}: ${JSON.stringify(plan.byId.get(id)?.problem ?? preparation)}`);
    const { job } = preparation;
    if (job.kind === 'script') await scripts.mend();
    const outcome = evaluateCell(job, { checkpoint: () => undefined, scripts });
    outcomes.set(id, outcome);
    results.set(id, [
      job.digest,
      outcome.status === 'ok' ? outcome.resultDigest : `failed: ${outcome.error.message}`,
    ]);
  }
  return results;
}

test('the results of fixed notebooks are those written down for this version of the engine', async () => {
  const notebooks = {
    'every kind': cellsOf('./engine-suite.stillroom.json'),
    'diacetyl rest': demo('diacetyl-rest'),
    'beads on a ring': demo('beads-on-a-ring'),
    'norovirus aboard a ferry': demo('norovirus-aboard-a-ferry'),
    'reference networks': references(),
  };
  const results: Record<string, readonly [string, string]> = {};
  for (const [name, cells] of Object.entries(notebooks))
    for (const [cell, digests] of await compute(cells)) results[`${name}: ${cell}`] = digests;
  expect(Object.entries(results).filter(([, [, result]]) => result.startsWith('failed'))).toEqual([]);

  const written = JSON.parse(readFileSync(digestsFile, 'utf8')) as Written;
  const before = new Map(Object.values(written.results));
  // Cells are known by their digests: that a notebook says something else is no change of the engine.
  const changed = Object.entries(results).filter(([, [digest, result]]) => {
    const known = before.get(digest);
    return known !== undefined && known !== result;
  });
  expect(
    changed.map(([cell]) => cell),
    howToRaise,
  ).toEqual([]);
  if (process.env['WRITE_RESULT_DIGESTS'] === '1') {
    writeFileSync(digestsFile, `${JSON.stringify({ engine: engineVersion, results }, null, 2)}\n`);
    return;
  }
  expect(written.engine, 'A new version of the engine: write its results down.').toBe(engineVersion);
  const missing = Object.entries(results).filter(([, [digest]]) => !before.has(digest));
  expect(
    missing.map(([cell]) => cell),
    'Cells that are not written down yet: WRITE_RESULT_DIGESTS=1 adds them.',
  ).toEqual([]);
}, 120_000);
