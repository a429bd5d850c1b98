import { closeCodes } from '@stillroom/shared/protocol';
import { computed, type ComputedRef } from 'vue';
import { clock, counted } from './dates.ts';
import type { Line } from './useLiveDocument.ts';

/** What the page says of the line, derived in one place. */
export interface ConnectionStatus {
  /** For the running head: "Kept 14:06", "Keeping…", "3 changes kept here only". */
  readonly words: string;
  readonly tone: 'kept' | 'keeping' | 'here only';
  /** A banner for a line that is down. */
  readonly down: { readonly since: string } | null;
  /** Why nothing can be shown or written any more, with what to do. */
  readonly ended: { readonly title: string; readonly words: string; readonly to: 'sign-in' | 'shelf' } | null;
}

const endings: Readonly<Record<number, ConnectionStatus['ended']>> = {
  [closeCodes.signedOut]: {
    title: 'You are signed out',
    words:
      'The session has ended. Sign in again; what you typed is kept on this machine and sent when you are back.',
    to: 'sign-in',
  },
  [closeCodes.refused]: {
    title: 'This notebook is not open to you',
    words:
      'Your part in it has been taken back, or it belongs to a group you are not in. A lead of the group can let you in again.',
    to: 'shelf',
  },
  [closeCodes.gone]: {
    title: 'This notebook is gone',
    words: 'It was deleted. It rests in its group’s bin for 30 days, where a lead can bring it back.',
    to: 'shelf',
  },
  [closeCodes.crowded]: {
    title: 'Too many notebooks are open at once',
    words:
      'You have more pages of notebooks open than one person may have. Close some of them and load this page again; what you typed is kept on this machine.',
    to: 'shelf',
  },
};

const otherEnding: ConnectionStatus['ended'] = {
  title: 'The server ended this page’s line',
  words: 'What you typed is kept on this machine. Load the page again to go on.',
  to: 'shelf',
};

/** One derived value for the whole state of the line. */
export function useConnectionStatus(line: Readonly<Line>): ComputedRef<ConnectionStatus> {
  return computed(() => {
    const down =
      line.phase === 'down' && line.downSince !== null
        ? { since: clock(line.downSince.toISOString()) }
        : null;
    const ended = line.endedBy === null ? null : (endings[line.endedBy] ?? otherEnding);
    if (line.pending > 0 && (line.phase !== 'open' || line.overdue))
      return { words: `${counted(line.pending, 'change')} kept here only`, tone: 'here only', down, ended };
    if (line.keptAt !== null && line.pending === 0)
      return { words: `Kept ${clock(line.keptAt.toISOString())}`, tone: 'kept', down, ended };
    const words = line.phase === 'open' ? 'Keeping…' : down === null ? 'Opening…' : 'Not connected';
    return { words, tone: 'keeping', down, ended };
  });
}
