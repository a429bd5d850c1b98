import { settingsComplaint } from '../cells/complaint.ts';
import { mapReferences } from '../cells/references.ts';
import { cellRegistry } from '../cells/registry.ts';
import { CanonicalLines } from '../notation/canonical.ts';
import { nearest } from '../notation/nearest.ts';
import { lineAndColumn } from '../paths/reading.ts';
import { limits } from '../protocol/limits.ts';
import type { CellError } from '../protocol/messages.ts';
import { digestOf } from './digest.ts';
import { type Draw, findDraws } from './draws.ts';
import { engineVersion } from './engine-version.ts';
import { type DrawGraph, drawGraph } from './graph.ts';
import { type Bearers, bearersOf, nameProblem } from './names.ts';
import type { NamedDraw, Plan, PlannableCell, PlannedCell } from './plan.ts';
import { plainText, sourceText } from './source-text.ts';

/** What a cell's own content says, whatever stands around it. */
interface OwnPart {
  readonly content: PlannableCell;
  readonly settingsText: string;
  readonly text: string;
  readonly draws: readonly Draw[];
  readonly complaint: string | null;
}

/** A digest and the digests it was made from. */
interface KeptDigest {
  readonly own: OwnPart;
  readonly from: string;
  readonly digest: string;
}

/**
 * What one notebook's plans remember from one to the next, so that a keystroke costs the work of one cell. It changes
 * no plan, only its cost; it holds the cells of the last plan and no others.
 */
export interface PlanMemory {
  own: Map<string, OwnPart>;
  digests: Map<string, KeptDigest>;
  /** Of networks, by cell: the lines that were read. */
  lines: Map<string, CanonicalLines>;
}

/** An empty memory, one for each notebook that is planned again and again. */
export const newPlanMemory = (): PlanMemory => ({ own: new Map(), digests: new Map(), lines: new Map() });

/** A text of fewer letters is read within milliseconds. */
const longText = 20_000;

/**
 * Reads long networks that changed, with pauses: each step takes some milliseconds. What it reads, the next plan with this
 * memory need not read; left out, or given up half way, it changes nothing but the time of that plan.
 */
export function* readAhead(cells: readonly PlannableCell[], memory: PlanMemory): Generator<void, void, void> {
  for (const cell of cells.slice(0, limits.cells)) {
    const { length } = cell.text;
    if (cell.kind !== 'network' || length < longText || length > limits.cellText) continue;
    if (memory.own.get(cell.id)?.content.text === cell.text) continue;
    try {
      yield* linesOf(cell, memory).read(plainText(cell.text));
    } catch (error) {
      // Nested too deep: the plan says so.
      if (!(error instanceof RangeError)) throw error;
    }
  }
}

function linesOf({ id }: PlannableCell, memory: PlanMemory): CanonicalLines {
  const lines = memory.lines.get(id) ?? new CanonicalLines();
  memory.lines.set(id, lines);
  return lines;
}

function readOwnPart(cell: PlannableCell, memory: PlanMemory): OwnPart {
  const before = memory.own.get(cell.id);
  const settingsText = JSON.stringify(cell.settings);
  if (
    before !== undefined &&
    before.content.kind === cell.kind &&
    before.settingsText === settingsText &&
    before.content.text === cell.text
  ) {
    return before;
  }
  if (cell.text.length > limits.cellText) {
    return { content: cell, settingsText, text: '', draws: [], complaint: lengthComplaint(cell) };
  }
  try {
    const text = sourceText(
      cell.kind,
      cell.text,
      cell.kind === 'network' ? linesOf(cell, memory) : undefined,
    );
    const draws = findDraws(cell.kind, text, cell.settings);
    return {
      content: cell,
      settingsText,
      text,
      draws,
      complaint: settingsComplaint(cell.kind, cell.settings),
    };
  } catch (error) {
    // The stack is what gives way first; the other cells go on.
    if (!(error instanceof RangeError)) throw error;
    return { content: cell, settingsText, text: '', draws: [], complaint: depthComplaint(cell) };
  }
}

const depthComplaint = ({ kind }: PlannableCell): string =>
  `This ${kind} is nested too deep to be read; take it apart into several cells.`;

/** A cell beyond what a notebook holds: it is not read. Its settings as text are none, so that no later plan takes this up. */
const excessPart = (cell: PlannableCell): OwnPart => ({
  content: cell,
  settingsText: '',
  text: '',
  draws: [],
  complaint: `A notebook takes at most ${limits.cells} cells; take some out, or begin another notebook.`,
});

const lengthComplaint = ({ kind, text }: PlannableCell): string =>
  `This ${kind} has ${text.length} characters; a cell takes at most ${limits.cellText}.`;

function missingProblem(draw: Draw, own: OwnPart, names: Iterable<string>): CellError {
  if (draw.name === '') {
    return {
      message: `This ${own.content.kind} has no ${draw.kind ?? 'cell'} to draw on yet.`,
      hint: 'Choose one.',
    };
  }
  const near = nearest(draw.name, names);
  return {
    message: `There is no cell called ${draw.name}.`,
    ...(near === null ? {} : { hint: `Is ${near} meant?` }),
    ...(draw.at === null ? {} : lineAndColumn(own.text, draw.at)),
  };
}

/** What stands in the way of drawing on the names a cell uses; null where nothing does. */
function drawProblem(own: OwnPart, bearers: Bearers): CellError | null {
  for (const draw of own.draws) {
    const found = bearers.get(draw.name) ?? [];
    const [only] = found;
    if (only === undefined) return missingProblem(draw, own, bearers.keys());
    if (found.length > 1) {
      return {
        message: `${found.length === 2 ? 'Two' : found.length} cells are called ${draw.name}, so it is not clear which is meant.`,
        hint: `Give each a name of its own.`,
      };
    }
    if (draw.kind !== null && only.kind !== draw.kind) {
      return {
        message: `A ${own.content.kind} draws on a ${draw.kind}, and ${draw.name} is a ${only.kind}.`,
      };
    }
  }
  return null;
}

function circleProblem(circle: readonly string[], nameOf: (id: string) => string): CellError {
  const names = circle.map(nameOf);
  const hint = 'Take one of these names out, so that each cell stands on others.';
  if (names.length === 1) return { message: `${names[0]} draws on itself.`, hint };
  return {
    message: `${names[0]} draws on ${[...names.slice(1), names[0]].join(', which draws on ')}.`,
    hint,
  };
}

/** Digest of a cell from its own part and the digests of what it draws on. */
function makeDigest(own: OwnPart, digestOfName: (name: string) => string | null): string {
  const { kind, settings } = own.content;
  const spelt = own.draws.filter(({ named }) => named);
  return digestOf({
    engine: engineVersion,
    kind,
    text: own.text,
    settings: mapReferences(cellRegistry[kind], settings, (name) => digestOfName(name.normalize('NFC'))),
    draws: Object.fromEntries(spelt.map(({ name }) => [name, digestOfName(name)])),
  });
}

/** One planning of one notebook: holds what its steps share. */
class Planning {
  private readonly bearers: Bearers;
  private readonly own = new Map<string, OwnPart>();
  private readonly digests = new Map<string, KeptDigest>();
  private readonly planned = new Map<string, PlannedCell>();
  private readonly cells: readonly PlannableCell[];
  private readonly memory: PlanMemory;

  constructor(cells: readonly PlannableCell[], memory: PlanMemory) {
    this.cells = cells;
    this.memory = memory;
    this.bearers = bearersOf(cells);
    for (const [place, cell] of cells.entries())
      this.own.set(cell.id, place < limits.cells ? readOwnPart(cell, memory) : excessPart(cell));
  }

  plan(): Plan {
    const inputs = new Map(this.cells.map(({ id }) => [id, this.inputsOf(id)]));
    const draws = new Map([...inputs].map(([id, named]) => [id, named.map((draw) => draw.id)]));
    const graph = drawGraph([...this.own.keys()], (id) => draws.get(id) ?? []);
    const byCell = new Map(this.cells.map((cell) => [cell.id, cell]));
    for (const id of graph.order) {
      const cell = byCell.get(id);
      if (cell !== undefined) this.planned.set(id, this.planCell(cell, inputs.get(id) ?? [], graph));
    }
    this.memory.own = this.own;
    for (const id of this.memory.lines.keys()) if (!this.own.has(id)) this.memory.lines.delete(id);
    this.memory.digests = this.digests;
    const cells = this.cells.flatMap(({ id }) => this.planned.get(id) ?? []);
    return { cells, byId: this.planned, order: graph.order };
  }

  private inputsOf(id: string): NamedDraw[] {
    return (this.own.get(id)?.draws ?? []).flatMap(({ name, reads }) => {
      const [bearer, another] = this.bearers.get(name) ?? [];
      return bearer === undefined || another !== undefined ? [] : [{ name, id: bearer.id, reads }];
    });
  }

  private planCell(cell: PlannableCell, inputs: readonly NamedDraw[], graph: DrawGraph): PlannedCell {
    const own = this.own.get(cell.id) ?? readOwnPart(cell, this.memory);
    const problem = this.problemOf(cell, own, inputs, graph);
    return {
      id: cell.id,
      name: cell.name.normalize('NFC'),
      kind: cell.kind,
      text: own.text,
      ...(own.text === cell.text ? {} : { written: cell.text }),
      settings: cell.settings,
      draws: inputs.map((input) => input.id),
      inputs,
      digest: problem === null ? this.digestFor(cell.id, own, inputs) : null,
      problem,
    };
  }

  private problemOf(
    cell: PlannableCell,
    own: OwnPart,
    inputs: readonly NamedDraw[],
    graph: DrawGraph,
  ): CellError | null {
    const circle = graph.circles.get(cell.id);
    const nameOf = (id: string) => this.own.get(id)?.content.name ?? id;
    return (
      nameProblem(cell, this.bearers) ??
      drawProblem(own, this.bearers) ??
      (own.complaint === null ? null : { message: own.complaint }) ??
      (circle === undefined ? null : circleProblem(circle, nameOf)) ??
      this.upstreamProblem(cell, inputs)
    );
  }

  /** A claim on a cell that cannot be computed is undecided; everything else has nothing to compute from. */
  private upstreamProblem(cell: PlannableCell, inputs: readonly NamedDraw[]): CellError | null {
    if (cell.kind === 'claim') return null;
    for (const { name, id } of inputs) {
      const cause = this.planned.get(id)?.problem;
      if (cause !== null && cause !== undefined) {
        return {
          message: `It draws on ${name}, which cannot be computed.`,
          hint: cause.hint ?? cause.message,
        };
      }
    }
    return null;
  }

  private digestFor(id: string, own: OwnPart, inputs: readonly NamedDraw[]): string {
    const digests = new Map(inputs.map((input) => [input.name, this.planned.get(input.id)?.digest ?? null]));
    const from = [...digests.values()].join(' ');
    const before = this.memory.digests.get(id);
    const kept =
      before !== undefined && before.own === own && before.from === from
        ? before
        : { own, from, digest: makeDigest(own, (name) => digests.get(name) ?? null) };
    this.digests.set(id, kept);
    return kept.digest;
  }
}

/**
 * Plans a notebook: resolves names, finds what draws on what, gives every cell that can be computed its digest and every
 * other one the reason in words. Pure; `memory` only saves time.
 *
 * @param cells in document order
 * @param memory what earlier plans of the same notebook have read, see `newPlanMemory`
 */
export function planNotebook(cells: readonly PlannableCell[], memory: PlanMemory = newPlanMemory()): Plan {
  return new Planning(cells, memory).plan();
}
