import { lineAndColumn } from '../paths/reading.ts';
import { locateJsonFault } from './locate.ts';

/** A JSON value, or a sentence on why the text is none, with its place. */
export type JsonReading =
  | { readonly ok: true; readonly value: unknown }
  | { readonly ok: false; readonly message: string; readonly line: number; readonly column: number };

/** Reads JSON; never throws. A byte order mark at the beginning is passed over. */
export function readJson(text: string): JsonReading {
  const source = text.startsWith('\uFEFF') ? text.slice(1) : text;
  try {
    return { ok: true, value: JSON.parse(source) };
  } catch {
    const fault = locateJsonFault(source);
    if (fault === null) return { ok: false, message: 'It is nested too deeply.', line: 1, column: 1 };
    return {
      ok: false,
      message: `${fault.found} stands where JSON has ${fault.expected}.`,
      ...lineAndColumn(source, fault.at),
    };
  }
}
