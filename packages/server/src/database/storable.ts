/**
 * Text as a column can hold it: PostgreSQL knows no NUL, which may come with what somebody pastes. It becomes the sign
 * for a character that could not be read.
 */
export const storableText = (text: string): string => text.replaceAll('\0', '\uFFFD');

/** An escape that `jsonb` refuses, NUL or half a surrogate pair, behind an even number of backslashes. */
const refused = /(?<=(?<!\\)(?:\\\\)*)\\u(?:0000|d[89a-f][0-9a-f]{2})/gu;

/** A value as JSON that a `jsonb` column or parameter takes. */
export const storableJson = (value: unknown): string => JSON.stringify(value).replace(refused, '\\ufffd');
