import { type CellKind, cellRegistry, complaintInWords } from '@stillroom/shared/cells';
import type { CellContent } from '@stillroom/shared/document';
import { ref, type Ref, watch } from 'vue';
import { useNotebook } from '../../../composables/useNotebook.ts';

/** How the text of a field and a setting become each other. `read` throws a sentence for text it cannot read. */
export interface Reading<Value> {
  /** undefined takes the setting away, so that the kind's default holds. */
  read(text: string): Value | undefined;
  print(value: unknown): string;
}

export interface SettingField {
  readonly text: Ref<string>;
  /** What is wrong with what is typed; the last good setting stays in force meanwhile. */
  readonly complaint: Ref<string | null>;
  /** Takes what is typed into the notebook, if it can be read. */
  typed(): void;
  /** The field was left: a setting changed by others meanwhile may show. */
  left(): void;
}

/** What the kind's schema says of one changed setting; null where it is well. */
export function settingComplaint(
  kind: CellKind,
  settings: CellContent['settings'],
  key: string,
  value: unknown,
): string | null {
  const next = { ...settings, [key]: value };
  if (value === undefined) delete next[key];
  const checked = cellRegistry[kind].settings.safeParse(next);
  if (checked.success) return null;
  const issue = checked.error.issues.find(({ path }) => path[0] === key || path.length === 0);
  return issue === undefined ? null : complaintInWords(issue, next, 'It');
}

/** One setting of a cell as a text field: nothing typed is lost, and only what the schema takes is written. */
export function useSetting<Value>(
  cell: () => CellContent,
  key: string,
  reading: Reading<Value>,
): SettingField {
  const { actions } = useNotebook();
  const setting = () => cell().settings[key];
  const text = ref(reading.print(setting()));
  const complaint = ref<string | null>(null);
  let typing = false;

  watch(
    () => reading.print(setting()),
    (printed) => {
      if (!typing && complaint.value === null) text.value = printed;
    },
  );

  function typed(): void {
    typing = true;
    let value: Value | undefined;
    try {
      value = reading.read(text.value);
    } catch (cause) {
      complaint.value = cause instanceof Error ? cause.message : String(cause);
      return;
    }
    complaint.value = settingComplaint(cell().kind, cell().settings, key, value);
    if (complaint.value === null && JSON.stringify(value) !== JSON.stringify(setting()))
      actions.setSettings(cell().id, { [key]: value });
  }

  return {
    text,
    complaint,
    typed,
    left() {
      typing = false;
      if (complaint.value === null) text.value = reading.print(setting());
    },
  };
}
