import { setImmediate as nextTurn, setTimeout as sleep } from 'node:timers/promises';
import type { CellJob, CellSettings } from '@stillroom/shared/cells';
import type { Person } from '@stillroom/shared/contracts';
import { type NotebookContent, readNotebook } from '@stillroom/shared/document';
import {
  type KnownOutcome,
  newPlanMemory,
  type Plan,
  type PlannedCell,
  planNotebook,
  type Preparation,
  prepareJob,
  readAhead,
} from '@stillroom/shared/plan';
import { limits } from '@stillroom/shared/protocol';
import type { Connection, Room, RoomObserver } from '../collaboration/index.ts';
import { Announcer } from './announcer.ts';
import { noticeOf, type Run, type StandingCell } from './cell-state.ts';
import type { Demand } from './demand.ts';
import type { CellNews } from './notices.ts';
import { laneOf, lanes, type RunOwner, type RunQueue } from './queue.ts';
import type { Known, ResultStore } from './results.ts';
import { asState, StateKeeper, type NotebookFile } from './state-keeper.ts';

export interface PlannerOptions {
  readonly room: Room;
  readonly results: ResultStore;
  readonly queue: RunQueue;
  /** Has a job computed, wherever there is a place. */
  readonly submit: (job: CellJob, owner: RunOwner) => Promise<void>;
  readonly demand: Demand;
  readonly file: NotebookFile;
  readonly failed: (words: string, error: unknown) => void;
}

/** Milliseconds of planning that nobody notices: more is followed by a rest as long, but never by a longer one than this. */
const noticeable = 20;
const longestRest = 1000;

const nothing: Plan = { cells: [], byId: new Map(), order: [] };

/**
 * Keeps the cells of one open notebook computed. Every change makes a new plan at once; what is known by its digest is
 * shown, what is not is run where somebody who may run is here, and everybody in the room is told of the difference.
 */
export class Planner implements RoomObserver {
  readonly #options: PlannerOptions;
  readonly #keeper: StateKeeper;
  readonly #announcer: Announcer;
  readonly #memory = newPlanMemory();
  #content: NotebookContent = { title: '', subject: 'none', cells: [] };
  #plan = nothing;
  readonly #known = new Map<string, Known>();
  readonly #runs = new Map<string, Run>();
  /** Digests that somebody asked to have computed, whatever is held or failed. */
  readonly #asked = new Set<string>();
  /** Digests of which news came: what is known of them is looked up before anything is run. */
  readonly #news = new Set<string>();
  #shown = new Map<string, string>();
  /** Whether somebody who may run cells has been here since the room opened. */
  #mayRun = false;
  #group = '';
  #opened = false;
  #dirty = false;
  /** Milliseconds for which the last pass held up everything else. */
  #cost = 0;
  #passing: Promise<void> | null = null;

  constructor(options: PlannerOptions) {
    this.#options = options;
    this.#announcer = new Announcer(options.room);
    this.#keeper = new StateKeeper(options.file, options.room.notebook, options.failed);
  }

  changed(by: Person | null): void {
    // Whoever writes may run: the role table gives both or neither.
    if (by !== null) this.#mayRun = true;
    this.replan();
  }

  joined(connection: Connection): void {
    if (connection.edits && !this.#mayRun) {
      this.#mayRun = true;
      this.replan();
    }
    if (this.#opened) this.#announcer.greet(connection, this.#each());
  }

  /** Whether a run is awaited or a plan is being made. */
  get busy(): boolean {
    return this.#runs.size > 0 || this.#passing !== null;
  }

  async closing(): Promise<void> {
    await this.#passing;
    await this.#keeper.flush();
  }

  closed(): void {
    this.#announcer.stop();
    for (const digest of this.#runs.keys()) this.#options.demand.release(digest, this);
  }

  /** Makes a new plan, after what is under way; several asked for at once become one. */
  replan(): void {
    this.#dirty = true;
    this.#passing ??= new Promise((resolve) => setImmediate(resolve))
      .then(() => this.#passes())
      .finally(() => {
        this.#passing = null;
      });
  }

  /** Lets cells that nobody has run yet be computed, as when a notebook has just been made. */
  run(): void {
    this.#mayRun = true;
    this.replan();
  }

  /** Something may be known under a digest now, or its run has ended without. */
  resultChanged(digest: string): void {
    if (!this.#runs.has(digest) && !this.#isPlanned(digest)) return;
    if (this.#known.get(digest)?.kept === true) return;
    this.#known.delete(digest);
    this.#options.demand.settle(digest, this);
    this.#runs.delete(digest);
    this.#news.add(digest);
    this.replan();
  }

  /** A run has begun or come further. */
  runMoved(digest: string, run: Run): void {
    if (!this.#isPlanned(digest) || this.#known.has(digest)) return;
    this.#runs.set(digest, run);
    this.#announce();
  }

  /** Forgets what may have changed while no news came. */
  afterGap(): void {
    for (const [digest, known] of this.#known) if (!known.kept) this.#known.delete(digest);
    this.#runs.clear();
    this.replan();
  }

  /**
   * Brings cells up to date: those named, with what their results stand on, or (null) all that are stale or were
   * ended. Held cells only where they are named.
   */
  async bringUpToDate(named: readonly string[] | null): Promise<void> {
    await this.settled();
    const ids = new Set(named ?? this.#plan.cells.filter(({ id }) => !this.#isHeld(id)).map(({ id }) => id));
    for (const id of ids)
      for (const { id: input, reads } of this.#plan.byId.get(id)?.inputs ?? [])
        if (reads === 'result' && !this.#isHeld(input)) ids.add(input);
    const digests = [...ids].flatMap((id) => this.#plan.byId.get(id)?.digest ?? []);
    const again = digests.filter((digest) => this.#known.get(digest)?.kept === false);
    await this.#forgive(again);
    for (const digest of digests) if (!this.#known.has(digest)) this.#asked.add(digest);
    this.replan();
  }

  /** Stops the run of a cell, where one is under way. */
  async stop(id: string): Promise<void> {
    await this.settled();
    const digest = this.#plan.byId.get(id)?.digest;
    if (typeof digest === 'string' && this.#runs.has(digest)) await this.#options.queue.end(digest, 'stop');
  }

  /** Resolves when the plan is that of the present document. */
  async settled(): Promise<void> {
    if (!this.#opened) this.replan();
    while (this.#passing !== null) await this.#passing;
  }

  /** The cells as they stand, in order, with title and subject. */
  async standing(): Promise<{ content: NotebookContent; cells: readonly StandingCell[]; plan: Plan }> {
    await this.settled();
    const cells = this.#each();
    return { content: this.#content, cells, plan: this.#plan };
  }

  /**
   * The job of a cell with other settings, for somebody's trial: nothing of it is planned or shown. What the cell draws on
   * stands as it is.
   */
  async trial(id: string, changes: CellSettings): Promise<{ preparation: Preparation; owner: RunOwner }> {
    await this.settled();
    const cells = this.#content.cells.map((cell) =>
      cell.id === id ? { ...cell, settings: { ...cell.settings, ...changes } } : cell,
    );
    // A copy of the memory: the trial's cell must not take the place of the true one.
    const plan = planNotebook(cells, { ...this.#memory });
    const preparation = prepareJob(plan, id, (input) => this.#outcomeOf(input));
    const name = `a trial of ${plan.byId.get(id)?.name ?? ''}`;
    return { preparation, owner: { group: this.#group, notebook: this.#options.room.notebook, name } };
  }

  /** Whether a digest is that of a cell here, or of the result one shows. */
  shows(digest: string): boolean {
    return this.#isPlanned(digest) || [...this.#shown.values()].includes(digest);
  }

  async #passes(): Promise<void> {
    try {
      if (!this.#opened) await this.#open();
      while (this.#dirty) {
        this.#dirty = false;
        await this.#pass();
        if (this.#dirty && this.#cost > noticeable) await sleep(Math.min(this.#cost, longestRest));
      }
    } catch (error) {
      this.#options.failed('A notebook could not be planned.', error);
    }
  }

  async #open(): Promise<void> {
    const { group, states } = await this.#keeper.open();
    this.#group = group;
    this.#shown = new Map(states.flatMap(({ cell, shown }) => (shown === null ? [] : [[cell, shown]])));
  }

  async #pass(): Promise<void> {
    const content = readNotebook(this.#options.room.doc);
    // A text of megabytes is read in steps: other notebooks are served between them.
    for (const _step of readAhead(content.cells, this.#memory)) await nextTurn();
    const began = performance.now();
    this.#content = content;
    this.#plan = planNotebook(content.cells, this.#memory);
    this.#cost = performance.now() - began;
    this.#letGo();
    await this.#learn();
    const submitted = this.#submitReady();
    this.#announce();
    await submitted;
  }

  /** Forgets what belongs to digests that no cell has any more. */
  #letGo(): void {
    const digests = new Set(this.#plan.cells.map(({ digest }) => digest));
    for (const digest of this.#runs.keys()) {
      if (digests.has(digest)) continue;
      this.#options.demand.release(digest, this);
      this.#runs.delete(digest);
    }
    for (const digest of this.#known.keys()) if (!digests.has(digest)) this.#known.delete(digest);
    for (const set of [this.#asked, this.#news])
      for (const digest of set) if (!digests.has(digest)) set.delete(digest);
  }

  /**
   * Finds out what is known under new digests, and where nobody here may run, what is run elsewhere. What is run at
   * once is not waited for, since the digest of an edit is nearly always new; should it be known, the run is ended.
   */
  async #learn(): Promise<void> {
    const { results, queue } = this.#options;
    const unknown = this.#plan.cells.filter(({ digest }) => digest !== null && !this.#known.has(digest));
    this.#take(unknown.flatMap(({ digest }) => results.peek(digest ?? '') ?? []));
    const open = unknown.filter(({ id, digest }) => !this.#knownOf(id) && !this.#runs.has(digest ?? ''));
    const digestsOf = (cells: readonly PlannedCell[]) => cells.flatMap(({ digest }) => digest ?? []);
    this.#lookAside(digestsOf(open.filter((cell) => this.#runsAtOnce(cell))));
    const asked = digestsOf(open.filter((cell) => !this.#runsAtOnce(cell)));
    if (asked.length === 0) return;
    this.#take((await results.find(asked)).values());
    for (const digest of asked) this.#news.delete(digest);
    if (this.#mayRun && this.#opened) return;
    for (const [digest, since] of await queue.runs(asked.filter((digest) => !this.#known.has(digest))))
      this.#runs.set(digest, { since, share: null, words: null });
  }

  #runsAtOnce({ id, kind, digest }: PlannedCell): boolean {
    const quick = laneOf(kind) === lanes.quick && !this.#news.has(digest ?? '');
    return quick && this.#opened && this.#mayRun && !this.#isHeld(id);
  }

  /** Looks up what is being run already; finding it plans anew. */
  #lookAside(digests: readonly string[]): void {
    if (digests.length === 0) return;
    this.#options.results.find(digests).then(
      (found) => {
        if (found.size > 0) this.replan();
      },
      (error: unknown) => this.#options.failed('Results could not be looked up.', error),
    );
  }

  #take(outcomes: Iterable<Known>): void {
    for (const known of outcomes) {
      this.#known.set(known.digest, known);
      if (this.#runs.delete(known.digest)) this.#options.demand.release(known.digest, this);
    }
  }

  /** Queues every cell that can be computed now and is to be. */
  async #submitReady(): Promise<void> {
    const { submit, demand, room } = this.#options;
    const submissions: Promise<void>[] = [];
    for (const id of this.#plan.order) {
      const planned = this.#plan.byId.get(id);
      const digest = planned?.digest ?? null;
      if (planned === undefined || digest === null || this.#isSettled(planned) || this.#runs.has(digest))
        continue;
      if (!this.#asked.has(digest) && (!this.#mayRun || this.#isHeld(id))) continue;
      const preparation = this.#prepare(id);
      if (preparation.state !== 'ready') continue;
      this.#runs.set(digest, { since: null, share: null, words: null });
      demand.want(digest, this);
      const owner = { group: this.#group, notebook: room.notebook, name: planned.name };
      submissions.push(submit(preparation.job, owner));
    }
    await Promise.all(submissions);
  }

  /**
   * Whether a cell needs no run: something is known. A result that is not kept stands on a failure before it, and is
   * worth nothing once that has been overcome.
   */
  #isSettled({ digest, inputs }: PlannedCell): boolean {
    const known = digest === null ? undefined : this.#known.get(digest);
    if (known === undefined) return false;
    if (known.kept || known.status === 'failed') return true;
    const stands = inputs.some(({ id }) => this.#knownOf(id)?.status === 'failed');
    if (!stands) void this.#forgive([known.digest]);
    return stands;
  }

  /** Forgets outcomes that are not kept, so that they are run again. */
  #forgive(digests: readonly string[]): Promise<void> {
    for (const digest of digests) {
      this.#known.delete(digest);
      this.#options.results.doubt(digest);
    }
    return this.#options.queue
      .forgive(digests)
      .catch((error: unknown) => this.#options.failed('The end of a run could not be forgotten.', error));
  }

  #prepare(id: string): Preparation {
    return prepareJob(this.#plan, id, (input) => this.#outcomeOf(input));
  }

  /** Results themselves are put into the job where it runs; here it only counts that there is one. */
  #outcomeOf(id: string): KnownOutcome | undefined {
    const known = this.#knownOf(id);
    if (known === undefined) return undefined;
    return known.status === 'ok' ? { status: 'ok', result: null } : { status: 'failed', error: known.error };
  }

  #knownOf(id: string): Known | undefined {
    const digest = this.#plan.byId.get(id)?.digest ?? null;
    return digest === null ? undefined : this.#known.get(digest);
  }

  #isPlanned(digest: string): boolean {
    return this.#plan.cells.some((cell) => cell.digest === digest);
  }

  #isHeld(id: string): boolean {
    return this.#content.cells.some((cell) => cell.id === id && cell.held !== null);
  }

  /** Everything there is to say of each cell, in document order. */
  #each(): (StandingCell & CellNews)[] {
    return this.#content.cells.flatMap((content) => {
      const planned = this.#plan.byId.get(content.id);
      if (planned === undefined) return [];
      const known = this.#knownOf(content.id);
      if (known?.status === 'ok') this.#shown.set(content.id, known.digest);
      const run = planned.digest === null ? undefined : this.#runs.get(planned.digest);
      const open = known === undefined && run === undefined && planned.problem === null;
      const preparation = open ? this.#prepare(content.id) : undefined;
      const shown = this.#shown.get(content.id) ?? null;
      const notice = noticeOf({ content, planned, known, run, preparation, shown }, this.#plan);
      const json = known !== undefined && rides(known) ? known.json : null;
      const waitsFor = preparation?.state === 'waiting' ? preparation.on : [];
      return {
        content,
        planned,
        known,
        notice,
        json,
        waitsFor,
        working: known === undefined && run !== undefined,
      };
    });
  }

  /** Tells everybody how the cells stand now, and has it written down. */
  #announce(): void {
    const all = this.#each();
    for (const id of this.#shown.keys()) if (!this.#plan.byId.has(id)) this.#shown.delete(id);
    if (this.#opened) this.#announcer.tell(all);
    // The first plan goes whole to everybody who came in before it was made.
    else this.#announcer.tellAll(all);
    this.#opened = true;
    this.#keeper.keep(this.#content, all.map(asState));
  }
}

/** Whether a result rides along in a notice: short ones do, and what a failed run left, since nobody can fetch that. */
const rides = (known: Known): boolean =>
  !known.kept || known.status === 'failed' || (known.json?.length ?? 0) <= limits.inlineResult;
