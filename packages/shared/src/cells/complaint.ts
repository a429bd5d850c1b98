import type * as z from 'zod/mini';
import type { CellSettings } from './cell.ts';
import type { CellKind } from './kind.ts';
import { cellRegistry } from './registry.ts';

type Issue = z.core.$ZodIssue;

const kindsOfValue: Readonly<Record<string, string>> = {
  string: 'text',
  number: 'a number',
  int: 'a whole number',
  boolean: 'true or false',
  array: 'a list',
  object: 'an object',
  record: 'an object',
};

/** A value as a person would quote it, shortened. */
function quoted(value: unknown): string {
  const text = JSON.stringify(value) ?? String(value);
  return text.length > 40 ? `${text.slice(0, 37)}…` : text;
}

const place = (path: readonly PropertyKey[]) =>
  path.reduce<string>((text, step) => {
    if (typeof step === 'number') return `${text}[${step}]`;
    return text === '' ? String(step) : `${text}.${String(step)}`;
  }, '');

function valueAt(value: unknown, path: readonly PropertyKey[]): unknown {
  return path.reduce<unknown>(
    (inner, step) =>
      typeof inner === 'object' && inner !== null ? (inner as Record<PropertyKey, unknown>)[step] : undefined,
    value,
  );
}

function needs(issue: Issue): string {
  switch (issue.code) {
    case 'invalid_type':
      return `needs ${kindsOfValue[issue.expected] ?? issue.expected}`;
    case 'invalid_value':
      return `needs one of ${issue.values.map(String).join(', ')}`;
    case 'too_small':
      if (issue.origin === 'string') return 'needs some text';
      if (issue.origin === 'array') return `needs at least ${issue.minimum} entries`;
      return `needs a number ${issue.inclusive === true ? 'of at least' : 'above'} ${issue.minimum}`;
    case 'too_big':
      if (issue.origin === 'string') return `takes at most ${issue.maximum} characters`;
      if (issue.origin === 'array') return `takes at most ${issue.maximum} entries`;
      return `needs a number ${issue.inclusive === true ? 'of at most' : 'below'} ${issue.maximum}`;
    case 'custom':
      return issue.message;
    default:
      return 'has a value that is not understood';
  }
}

/**
 * One sentence on the first thing a schema complains of: where, what is needed, what was found.
 *
 * @param subject what the value is, to begin the sentence with: "This trajectory", "The file"
 */
export function complaintInWords(issue: Issue, value: unknown, subject: string): string {
  const at = place(issue.path);
  if (issue.code === 'unrecognized_keys') {
    const keys = issue.keys.map((key) => `"${key}"`).join(' and ');
    return `${subject} has no ${at === '' ? 'setting' : `key in ${at}`} called ${keys}.`;
  }
  const found = valueAt(value, issue.path);
  if (at === '') return `${subject} ${needs(issue)}.`;
  return found === undefined
    ? `${subject} ${needs(issue)} under "${at}", which is missing.`
    : `${subject} ${needs(issue)} under "${at}", not ${quoted(found)}.`;
}

/** What is wrong with the settings of a cell, in one sentence; null where they are as the kind needs them. */
export function settingsComplaint(kind: CellKind, settings: CellSettings): string | null {
  const checked = cellRegistry[kind].settings.safeParse(settings);
  if (checked.success) return null;
  const issue = checked.error.issues[0];
  return issue === undefined ? null : complaintInWords(issue, settings, `This ${kind}`);
}
