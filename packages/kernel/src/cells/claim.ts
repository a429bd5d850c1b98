import type { CellJob, ClaimResult, ClaimSide } from '@stillroom/shared/cells';
import {
  type ClaimExpression,
  type ClaimTerm,
  lineAndColumn,
  parseClaim,
  type Path,
  resolvePath,
} from '@stillroom/shared/paths';
import { calculate, callFunction, numberIn, opposite } from '../claims/arithmetic.ts';
import { ClaimMistake, type ClaimValue, claimValue, sideOf, Undecided } from '../claims/claim-value.ts';
import { judge } from '../claims/compare.ts';
import { CellFailure } from '../engine/failure.ts';
import { inputOf } from '../engine/inputs.ts';
import { parseRational, ZERO } from '../exact/index.ts';

interface Figure {
  readonly path: string;
  readonly value: ClaimSide;
}

/** The times that belong to a list of a result: its `times`, where there are as many. */
function timesBeside(result: unknown, length: number): readonly number[] | null {
  const times = resolvePath(result, { head: '', steps: ['times'] });
  return times.found && Array.isArray(times.value) && times.value.length === length
    ? (times.value as number[])
    : null;
}

/** Works out one claim over the results of a job. */
class Evaluation {
  readonly figures: Figure[] = [];
  private readonly job: CellJob;

  constructor(job: CellJob) {
    this.job = job;
  }

  value(term: ClaimTerm): ClaimValue {
    switch (term.kind) {
      case 'number':
        return { kind: 'exact', value: parseRational(term.text.replace(/^\./u, '0.')) ?? ZERO };
      case 'word':
        return { kind: 'word', text: term.text };
      case 'truth':
        return { kind: 'truth', value: term.value };
      case 'negate':
        return opposite(numberIn(this.value(term.of), 'A minus'));
      case 'binary': {
        const left = numberIn(this.value(term.left), term.operator);
        return calculate(term.operator, left, numberIn(this.value(term.right), term.operator));
      }
      case 'call': {
        const value = callFunction(
          term.name,
          term.arguments.map((given) => this.value(given)),
        );
        if (term.arguments.some(({ kind }) => kind === 'path')) this.note(term.from, term.to, value);
        return value;
      }
      case 'path': {
        const value = this.found(term.path);
        if (value.kind !== 'list') this.note(term.path.from, term.path.to, value);
        return value;
      }
    }
  }

  private note(from: number, to: number, value: ClaimValue): void {
    const path = this.job.text.slice(from, to).replace(/\s+/gu, ' ');
    if (this.figures.every((figure) => figure.path !== path))
      this.figures.push({ path, value: sideOf(value) });
  }

  private found(path: Path): ClaimValue {
    const input = inputOf(this.job, path.head);
    if (input === undefined) throw new ClaimMistake(`There is no cell called ${path.head}.`, path.from);
    const spelt = this.job.text.slice(path.from, path.to);
    const found = resolvePath(input.result, path);
    if (!found.found) throw new ClaimMistake(found.message, path.from, found.hint);
    const value = claimValue(found.value, input.kind, path.steps, spelt);
    return value.kind === 'list'
      ? { ...value, times: timesBeside(input.result, value.entries.length) }
      : value;
  }
}

/** A claim that cannot be judged because a cell it draws on has no result. */
function undecidedByInput(job: CellJob): ClaimResult | null {
  for (const [name, input] of Object.entries(job.inputs)) {
    if (input.failed === undefined) continue;
    const why =
      input.digest === null ? `${name} cannot be computed.` : `${name} failed: ${input.failed.message}`;
    return { verdict: 'undecided', left: null, right: null, why, figures: [] };
  }
  return null;
}

function decide(job: CellJob, claim: ClaimExpression): ClaimResult {
  const evaluation = new Evaluation(job);
  let left: ClaimValue | null = null;
  let right: ClaimValue | null = null;
  try {
    left = evaluation.value(claim.left);
    right = evaluation.value(claim.right);
    const { holds, why } = judge(claim.comparison, left, right);
    const exactly = left.kind !== 'measured' && right.kind !== 'measured';
    return {
      verdict: holds ? 'holds' : 'fails',
      left: sideOf(left, exactly),
      right: sideOf(right, exactly),
      why,
      figures: evaluation.figures,
    };
  } catch (error) {
    if (!(error instanceof Undecided)) throw error;
    return {
      verdict: 'undecided',
      left: left === null ? null : sideOf(left),
      right: right === null ? null : sideOf(right),
      why: error.message,
      figures: evaluation.figures,
    };
  }
}

/**
 * Judges a claim: one comparison over the results of other cells. Exact values are compared exactly; `==` and `!=` refuse
 * measured ones. Undecided where a cell it draws on failed or a value is not known.
 *
 * @throws CellFailure where the claim cannot be read, names what is not there, or compares what cannot be compared
 */
export function evaluateClaim(job: CellJob): ClaimResult {
  const claim = parseClaim(job.text);
  if (!claim.ok) {
    const { message, hint, at } = claim.misreading;
    throw new CellFailure(message, { ...lineAndColumn(job.text, at), ...(hint === null ? {} : { hint }) });
  }
  const undecided = undecidedByInput(job);
  if (undecided !== null) return undecided;
  try {
    return decide(job, claim.value);
  } catch (error) {
    if (!(error instanceof ClaimMistake)) throw error;
    throw new CellFailure(error.message, {
      ...(error.from === null ? {} : lineAndColumn(job.text, error.from)),
      ...(error.hint === null ? {} : { hint: error.hint }),
    });
  }
}
