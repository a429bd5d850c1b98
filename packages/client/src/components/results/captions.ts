import type { CellKind } from '@stillroom/shared/cells';
import { numberText } from './numbers.ts';
import { isObject, type TrajectoryResult } from './shapes.ts';

/** What a cell shows, of which a caption is made. */
export interface Captioned {
  readonly kind: CellKind;
  readonly text: string;
  readonly settings: Readonly<Record<string, unknown>>;
}

/** The comment at the head of a network, which is its caption. */
function headComment(text: string): string {
  const lines: string[] = [];
  for (const line of text.split('\n')) {
    const comment = /^\s*#\s?(.*)$/u.exec(line)?.[1];
    if (comment === undefined) break;
    // Words set apart by room in the ledger are a list.
    if (comment.trim() !== '') lines.push(comment.trim().replaceAll(/\s{2,}/gu, ', '));
  }
  // A line that ends in the middle of a sentence goes on in the next.
  const words = lines.reduce(
    (all, line) => (all === '' ? line : `${all}${/[,;:.]$/u.test(all) ? '' : ';'} ${line}`),
    '',
  );
  return words === '' || /[.?:;]$/u.test(words) ? words : `${words}.`;
}

const named = (setting: unknown, otherwise: string) =>
  typeof setting === 'string' && setting !== '' ? setting : otherwise;

function courses(settings: Captioned['settings'], result: unknown): string {
  if (!isObject(result)) return '';
  const { times = [], units } = result as unknown as Partial<TrajectoryResult>;
  const end = `${numberText(times.at(-1) ?? 0)} ${units?.time ?? ''}`.trimEnd();
  return `Courses of ${named(settings['network'], 'the network')} from its rate equations, up to ${end}.`;
}

/** One or two sentences that say what the figure shows. */
export function captionOf({ kind, text, settings }: Captioned, result: unknown): string {
  switch (kind) {
    case 'network':
      return headComment(text);
    case 'structure':
      return `The complexes of ${named(settings['network'], 'the network')}, by linkage class, and what the theorems say.`;
    case 'balance':
      return `Balance of ${named(settings['network'], 'the network')} at its constants.`;
    case 'trajectory':
      return courses(settings, result);
    case 'plot':
      return named(settings['caption'], '');
    default:
      return '';
  }
}
