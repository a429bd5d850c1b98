import { cellText } from '@stillroom/shared/document';
import {
  addRow,
  applyChanges,
  type Complaint,
  removeRow,
  type Repair,
  setRowField,
  type TableField,
  tableOf,
} from '@stillroom/shared/notation';
import { computed, onScopeDispose, shallowRef, watch } from 'vue';
import { useNotebook } from '../../composables/useNotebook.ts';
import { type PersonInText, usePeopleInText } from '../../composables/usePeopleInText.ts';
import { shownAtOnce, soon, untilRest } from '../../editor/complaints.ts';
import { checkNotation } from '../../editor/notationReading.ts';
import {
  complaintsByRow,
  fieldAt,
  fieldStart,
  type KeyedRow,
  keyRows,
  type RowComplaint,
} from '../../editor/tableRows.ts';
import { editNetwork } from '../../editor/textEdits.ts';
import { OwnCursor } from '../../editor/travellingCursors.ts';

export type RowFields = Partial<Record<TableField, string>>;

/**
 * The rows of a network's live text, and what one may do to them; every change is one of the text. `typing` gives the key
 * of the row in which one types, which is not scolded at once.
 */
export function useNetworkTable(cell: () => string, typing: () => number | null) {
  const notebook = useNotebook();
  const live = computed(() => {
    const room = notebook.live.room.value;
    return room === null ? undefined : cellText(room.doc, cell());
  });
  const text = shallowRef('');
  const rows = shallowRef<readonly KeyedRow[]>([]);
  const complaints = shallowRef<readonly Complaint[]>([]);
  /** What is wrong with each row, by its key, and with what is no row. */
  const wrong = shallowRef<ReadonlyMap<number, readonly RowComplaint[]>>(new Map());
  const others = shallowRef<readonly Complaint[]>([]);
  /** The text in which the complaints were found. */
  let checked = '';
  let keys = 0;
  /** The key that the next new row gets: that of the empty line in which it was written. */
  let reserved: number | null = null;
  const fresh = (): number => {
    const key = reserved ?? (keys += 1);
    reserved = null;
    return key;
  };

  function read(): void {
    text.value = live.value?.toString() ?? '';
    rows.value = keyRows(rows.value, tableOf(text.value), fresh);
  }
  watch(
    live,
    (now, before) => {
      before?.unobserve(read);
      now?.observe(read);
      read();
    },
    { immediate: true },
  );

  let timer: ReturnType<typeof setTimeout> | undefined;
  const wait = (time: number, then: () => void): void => {
    clearTimeout(timer);
    timer = setTimeout(then, time);
  };
  function show(found: readonly Complaint[]): void {
    complaints.value = found;
    const { of, others: rest } = complaintsByRow(text.value, rows.value, found);
    wrong.value = new Map(rows.value.map(({ key, line }) => [key, of.get(line) ?? []]));
    others.value = rest;
  }
  async function check(): Promise<void> {
    const asked = text.value;
    const found = await checkNotation(asked);
    if (asked !== text.value) return;
    checked = asked;
    const line = rows.value.find(({ key }) => key === typing())?.line ?? 0;
    const now = shownAtOnce(found, complaints.value, line);
    show(now);
    if (now.length < found.length) wait(untilRest, () => show(found));
  }
  watch(text, () => wait(soon, () => void check()), { immediate: true });
  onScopeDispose(() => {
    clearTimeout(timer);
    live.value?.unobserve(read);
  });

  const people = usePeopleInText(cell);
  /** Co-authors by the field their caret stands in: "KEY FIELD". */
  const peopleAt = computed(() => {
    const at = new Map<string, PersonInText[]>();
    for (const person of people.value) {
      const place = fieldAt(text.value, rows.value, person.head);
      if (place === null) continue;
      const key = `${place.key} ${place.field}`;
      at.set(key, [...(at.get(key) ?? []), person]);
    }
    return at;
  });

  let own: OwnCursor | null = null;
  /** Tells co-authors where in a field one's caret stands; in a row that is not in the text yet, nowhere. */
  function point(key: number, field: TableField, caret: number): void {
    const room = notebook.live.room.value;
    const start = fieldStart(text.value, indexOf(key), field);
    if (room === null || live.value === undefined || start === null) return;
    const at = Math.min(start + caret, text.value.length);
    own ??= new OwnCursor(room.awareness);
    own.tell(live.value, { anchor: at, head: at });
  }
  const unpoint = (): void => own?.forget();
  // Another line to the server brings another awareness.
  watch(notebook.live.room, () => (own = null));
  onScopeDispose(unpoint);

  const indexOf = (key: number): number => rows.value.findIndex((row) => row.key === key);

  /** Writes a field; false where the row would be none any more, and nothing is written. */
  function write(key: number, field: TableField, value: string): boolean {
    const change = setRowField(text.value, indexOf(key), field, value);
    if (change === null || live.value === undefined) return false;
    if (tableOf(applyChanges(text.value, [change])).length !== rows.value.length) return false;
    editNetwork(live.value, change);
    return true;
  }

  /** Writes a new row after another (null: at the end) under a key; false where the fields make no row. */
  function add(after: number | null, fields: RowFields, key: number): boolean {
    if (live.value === undefined) return false;
    const index = after === null ? -1 : indexOf(after);
    const change = addRow(text.value, index < 0 ? rows.value.length - 1 : index, fields);
    if (tableOf(applyChanges(text.value, [change])).length !== rows.value.length + 1) return false;
    reserved = key;
    editNetwork(live.value, change);
    reserved = null;
    return true;
  }

  function remove(key: number): void {
    const change = removeRow(text.value, indexOf(key));
    if (change !== null && live.value !== undefined) editNetwork(live.value, change);
  }

  /** Takes a repair, unless the text has changed since it was offered. */
  function repair(change: Repair): void {
    if (live.value !== undefined && checked === text.value) editNetwork(live.value, change);
  }

  const newKey = () => (keys += 1);
  return { rows, complaints, wrong, others, peopleAt, newKey, write, add, remove, repair, point, unpoint };
}
