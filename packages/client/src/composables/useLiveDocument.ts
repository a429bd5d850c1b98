import { cellText, readCell } from '@stillroom/shared/document';
import { closeCodes, type Notice, type PlanNotice } from '@stillroom/shared/protocol';
import { onScopeDispose, reactive, readonly, shallowRef, type ShallowRef } from 'vue';
import { LiveRoom } from '../live/room.ts';

/** Text of this person that the server refused, to be copied elsewhere. */
export interface SetAside {
  readonly cell: string;
  readonly name: string;
  readonly text: string;
}

export type LinePhase = 'opening' | 'open' | 'down' | 'ended';

/** What is known of the line to the server. */
export interface Line {
  phase: LinePhase;
  /** Whether the document is here, from the server or from this machine. */
  ready: boolean;
  /** Changes on this machine only. */
  pending: number;
  /** Whether the server has been silent about them for longer than a line that is well takes. */
  overdue: boolean;
  /** When all was last known to be kept. */
  keptAt: Date | null;
  downSince: Date | null;
  /** Close code for which the line ended for good. */
  endedBy: number | null;
}

export interface LiveDocument {
  readonly room: Readonly<ShallowRef<LiveRoom | null>>;
  readonly line: Readonly<Line>;
  readonly setAside: Readonly<ShallowRef<readonly SetAside[]>>;
  /** Tries the line at once. */
  retry(): void;
  /** Sets aside what the server has not taken and will not: this person may no longer write. */
  withdraw(): void;
  /** Drops the set-aside text once the person has dealt with it. */
  clearSetAside(): void;
}

/** Milliseconds after which an answer that has not come is told. */
const longestWait = 4000;

const fresh = (): Line => ({
  phase: 'opening',
  ready: false,
  pending: 0,
  overdue: false,
  keptAt: null,
  downSince: null,
  endedBy: null,
});

/**
 * Keeps one notebook open while the calling scope lives. Where the server refuses a change because a role was taken,
 * the person's unsent text is set aside and a fresh document opened, so that what is shown is what is kept.
 */
export function useLiveDocument(
  notebook: string,
  person: string,
  on: {
    plan(notice: PlanNotice): void;
    notice(notice: Notice): void;
    refused(): void;
    /** The line is back after it was down: what one may do here may have changed meanwhile. */
    returned(): void;
  },
): LiveDocument {
  const room = shallowRef<LiveRoom | null>(null);
  const line = reactive<Line>(fresh());
  const setAside = shallowRef<readonly SetAside[]>([]);
  const unkept = new Set<string>();
  let closed = false;
  let patience: ReturnType<typeof setTimeout> | undefined;

  function rescue(from: LiveRoom): SetAside[] {
    return [...unkept].flatMap((id) => {
      const text = cellText(from.doc, id)?.toString() ?? '';
      return text === '' ? [] : [{ cell: id, name: readCell(from.doc, id)?.name ?? '', text }];
    });
  }

  async function refused(from: LiveRoom): Promise<void> {
    const mine = from.count.pending > 0 ? rescue(from) : [];
    const hadWritten = from.count.pending > 0;
    unkept.clear();
    room.value = null;
    await from.destroy(true);
    if (closed) return;
    if (mine.length > 0) setAside.value = [...setAside.value, ...mine];
    // Nothing was refused but the door itself: a fresh document would be refused too.
    if (hadWritten) open();
    else Object.assign(line, { phase: 'ended', endedBy: closeCodes.refused });
  }

  function open(): void {
    Object.assign(line, fresh());
    const opened: LiveRoom = new LiveRoom(notebook, `stillroom.${person}.${notebook}`, {
      line(state) {
        if (state === 'synced') {
          if (line.downSince !== null) on.returned();
          Object.assign(line, { phase: 'open', ready: true, downSince: null });
          if (opened.count.settled) line.keptAt = new Date();
        } else if (state === 'down' || (state === 'connecting' && line.phase !== 'opening')) {
          if (line.phase === 'ended') return;
          line.phase = 'down';
          line.downSince ??= new Date();
        }
      },
      counted(count) {
        line.pending = count.pending;
        if (count.settled) {
          clearTimeout(patience);
          patience = undefined;
          line.overdue = false;
        } else patience ??= setTimeout(() => (line.overdue = true), longestWait);
        if (!count.settled || line.phase !== 'open') return;
        line.keptAt = new Date();
        unkept.clear();
      },
      restored() {
        // A copy with cells can be worked on before the server has answered.
        if (opened.doc.share.size > 0 && opened.doc.store.clients.size > 0) line.ready = true;
        if (line.phase === 'opening') opened.connect();
      },
      wrote: (cells) => cells.forEach((cell) => unkept.add(cell)),
      plan: on.plan,
      notice: on.notice,
      ended(code) {
        if (code === closeCodes.refused) {
          on.refused();
          void refused(opened);
        } else Object.assign(line, { phase: 'ended', endedBy: code });
      },
    });
    room.value = opened;
  }

  // A line that could not be opened at all is told as down, not as opening for ever.
  const opening = setTimeout(() => {
    if (line.phase === 'opening') Object.assign(line, { phase: 'down', downSince: new Date() });
  }, longestWait);
  const back = () => room.value?.connect();
  // The browser knows sooner than the socket does.
  const away = () => room.value?.disconnect();

  open();
  addEventListener('online', back);
  addEventListener('offline', away);

  onScopeDispose(() => {
    closed = true;
    clearTimeout(opening);
    clearTimeout(patience);
    removeEventListener('online', back);
    removeEventListener('offline', away);
    void room.value?.destroy();
    room.value = null;
  });

  return {
    room,
    line: readonly(line),
    setAside,
    retry: back,
    withdraw() {
      if (room.value !== null && room.value.count.pending > 0) void refused(room.value);
    },
    clearSetAside: () => (setAside.value = []),
  };
}
