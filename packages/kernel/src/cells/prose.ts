import { bibliographyOf } from '@stillroom/shared/bibliography';
import type { CellJob, ProseResult, WovenValue } from '@stillroom/shared/cells';
import {
  findWoven,
  lineAndColumn,
  type Path,
  printPath,
  resolvePath,
  unitAt,
  type Woven,
  type WovenSpan,
  wovenText,
} from '@stillroom/shared/paths';
import MarkdownIt, { type Token } from 'markdown-it';
import { CellFailure } from '../engine/failure.ts';
import { resultOf } from '../engine/inputs.ts';
import { citationRule } from '../prose/citation-rule.ts';
import { mathRule } from '../prose/math-rule.ts';
import { safeRules } from '../prose/safe-rules.ts';
import { type Weave, weaveOf, wovenRule } from '../prose/woven-rule.ts';

/** The `times` of a result, for values at a time of their course. */
function timesOf(result: unknown): readonly number[] | null {
  const times = resolvePath(result, { head: '', steps: ['times'] });
  return times.found && Array.isArray(times.value) ? (times.value as number[]) : null;
}

/** The woven values of one text: each spelling is worked out once. */
class Weaving {
  readonly values: WovenValue[] = [];
  private readonly known = new Map<string, Weave>();
  private readonly job: CellJob;

  constructor(job: CellJob) {
    this.job = job;
  }

  /** @throws CellFailure, at the place of the span in the text where `placed` */
  weave(span: WovenSpan, placed: boolean): Weave {
    const known = this.known.get(span.source);
    if (known !== undefined) return known;
    const fail = (message: string, hint: string | null, at: number): never => {
      throw new CellFailure(message, {
        ...(placed ? lineAndColumn(this.job.text, at) : {}),
        ...(hint === null ? {} : { hint }),
      });
    };
    const inside = span.from + 2;
    if (!span.woven.ok) {
      const { message, hint, at } = span.woven.misreading;
      return fail(message, hint, inside + at);
    }
    const { path } = span.woven.value;
    const { input, result } = resultOf(this.job, path.head);
    const found = resolvePath(result, path);
    if (!found.found) return fail(found.message, found.hint, inside + path.from);
    const words = wovenText(found.value, span.woven.value.filters, {
      times: timesOf(result),
      unit: unitAt(input.kind, result, path.steps),
    });
    if (!words.ok) return fail(words.message, words.hint, inside + path.from);
    return this.note(span.source, span.woven.value, words.text, input.digest ?? '');
  }

  private note(source: string, { path }: Woven, text: string, digest: string): Weave {
    const printed = spellPath(path);
    const weave = { path: printed, cell: path.head, text };
    this.known.set(source, weave);
    this.values.push({ path: printed, text, digest });
    return weave;
  }
}

const spellPath = (path: Path): string => printPath(path.head, path.steps);

function headingsOf(tokens: readonly Token[]): ProseResult['headings'] {
  return tokens.flatMap((token, index) => {
    if (token.type !== 'heading_open') return [];
    const words = (tokens[index + 1]?.children ?? []).map((child) =>
      child.type === 'woven' ? weaveOf(child).text : child.content,
    );
    return [{ level: Number(token.tag.slice(1)), text: words.join('').trim() }];
  });
}

/** The first line of a fence's content stands one line below the line it begins in; lines of cells count from 1. */
function unreadable(message: string, line: number, inside: string, at: number): never {
  const place = lineAndColumn(inside, at);
  throw new CellFailure(`The BibTeX cannot be read: ${message}`, {
    line: line + 1 + place.line,
    column: place.column,
  });
}

/**
 * Sets Markdown as HTML: without raw HTML, styles or foreign pictures; mathematics left to the page; values of other
 * cells woven in; works cited and listed.
 *
 * @throws CellFailure where a woven value or BibTeX cannot be read or found, with its place
 */
export function evaluateProse(job: CellJob): ProseResult {
  const weaving = new Weaving(job);
  for (const span of findWoven(job.text)) weaving.weave(span, true);
  const markdown = new MarkdownIt({ html: false, linkify: false, typographer: false });
  mathRule(markdown);
  citationRule(markdown, bibliographyOf(job.text), unreadable);
  wovenRule(markdown, (span) => weaving.weave(span, false));
  safeRules(markdown);
  const environment = {};
  const tokens = markdown.parse(job.text, environment);
  const headings = headingsOf(tokens);
  const html = markdown.renderer.render(tokens, markdown.options, environment);
  return { html, values: weaving.values, headings };
}
