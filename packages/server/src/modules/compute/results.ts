import type { CellJob, CellKind, CellOutcome } from '@stillroom/shared/cells';
import { type CellError, limits } from '@stillroom/shared/protocol';
import type { Queries } from '../notebooks/index.ts';

interface KnownBase {
  readonly digest: string;
  readonly kind: CellKind;
  readonly warnings: readonly string[];
  /** Milliseconds. */
  readonly took: number;
  /**
   * Whether any run would come to this. What is not kept came from outside (deadline, memory, Stop) or stands on such a
   * run; it holds until the cell is run again.
   */
  readonly kept: boolean;
  /** Text of the result, or of the part a failed run left, where it is short enough to ride along in a notice. */
  readonly json: string | null;
}

export interface KnownResult extends KnownBase {
  readonly status: 'ok';
  readonly resultDigest: string;
}

export interface KnownFailure extends KnownBase {
  readonly status: 'failed';
  readonly error: CellError;
}

/** What is known under a digest. */
export type Known = KnownResult | KnownFailure;

interface Row extends KnownBase {
  readonly result_digest: string | null;
  readonly error: CellError | null;
}

/** What a failed run left is fetched by nobody, so more of it rides along. */
const partialResult = 1_000_000;
/** Characters of results kept in memory at most, and how many outcomes are remembered. */
const textCapacity = 64_000_000;
const knownCapacity = 20_000;

/** Outcomes by digest. A kept one never changes, so it is remembered; short texts ride along, long ones are read when asked for. */
export class ResultStore {
  readonly #queries: Queries;
  readonly #known = new Map<string, Known>();
  readonly #texts = new Map<string, string>();
  #characters = 0;

  constructor(queries: Queries) {
    this.#queries = queries;
  }

  /** What is known in memory. */
  peek(digest: string): Known | undefined {
    return this.#known.get(digest);
  }

  /** What is known of these digests; those that were never computed are left out. */
  async find(digests: Iterable<string>): Promise<Map<string, Known>> {
    const found = new Map<string, Known>();
    const missing: string[] = [];
    for (const digest of new Set(digests)) {
      const known = this.#known.get(digest);
      if (known === undefined) missing.push(digest);
      else found.set(digest, known);
    }
    if (missing.length === 0) return found;
    const rows = (await this.#queries.query(
      `select digest, kind, case when length(result) <= case when error is null then $2::int else $3::int end
         then result end as json, result_digest, error, warnings, took, true as kept
       from cell_result where digest = any($1)
       union all
       select digest, kind, case when length(result) <= $3 then result end, result_digest, error, warnings, took, false
       from cell_attempt a where digest = any($1)
         and not exists (select from cell_result r where r.digest = a.digest)`,
      [missing, limits.inlineResult, partialResult],
    )) as Row[];
    for (const row of rows) {
      const known = asKnown(row);
      this.#remember(known);
      found.set(known.digest, known);
    }
    return found;
  }

  /** The JSON text of a result; null where there is none. */
  async text(digest: string): Promise<string | null> {
    const held = this.#texts.get(digest);
    if (held !== undefined) return held;
    const [row] = (await this.#queries.query(
      `select result, true as kept from cell_result where digest = $1 and error is null
       union all select result, false from cell_attempt where digest = $1 and error is null`,
      [digest],
    )) as { result: string; kept: boolean }[];
    if (row === undefined) return null;
    if (row.kept) this.#rememberText(digest, row.result);
    return row.result;
  }

  /** Remembers what a run has just come to and what is kept of it. */
  learn(
    job: Pick<CellJob, 'digest' | 'kind'>,
    outcome: CellOutcome,
    json: string | null,
    took: number,
  ): void {
    const { digest, kind } = job;
    const { warnings, keep: kept } = outcome;
    const fetched = kept && outcome.status === 'ok';
    const short =
      json !== null && json.length <= (fetched ? limits.inlineResult : partialResult) ? json : null;
    const base = { digest, kind, warnings, took, kept, json: short };
    if (outcome.status === 'failed') this.#remember({ ...base, status: 'failed', error: outcome.error });
    else this.#remember({ ...base, status: 'ok', resultDigest: outcome.resultDigest });
    if (fetched && json !== null) this.#rememberText(digest, json);
  }

  /** Forgets an outcome that is not kept and may have been overcome. */
  doubt(digest: string): void {
    if (this.#known.get(digest)?.kept === false) this.#known.delete(digest);
  }

  /** Doubts all of them, as after a time without news. */
  doubtAll(): void {
    for (const digest of [...this.#known.keys()]) this.doubt(digest);
  }

  #remember(known: Known): void {
    this.#known.delete(known.digest);
    this.#known.set(known.digest, known);
    dropOldest(this.#known, () => this.#known.size > knownCapacity);
  }

  #rememberText(digest: string, text: string): void {
    if (this.#texts.has(digest)) return;
    this.#texts.set(digest, text);
    this.#characters += text.length;
    dropOldest(
      this.#texts,
      () => this.#characters > textCapacity && this.#texts.size > 1,
      (dropped) => (this.#characters -= dropped.length),
    );
  }
}

function asKnown({ result_digest, error, ...base }: Row): Known {
  if (error !== null) return { ...base, status: 'failed', error };
  return { ...base, status: 'ok', resultDigest: result_digest ?? '' };
}

/** Drops what was put in first while there is too much. */
function dropOldest<V>(map: Map<string, V>, tooMuch: () => boolean, dropped?: (value: V) => void): void {
  for (const [key, value] of map) {
    if (!tooMuch()) return;
    map.delete(key);
    dropped?.(value);
  }
}
