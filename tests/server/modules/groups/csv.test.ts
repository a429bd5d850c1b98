import { expect, test } from 'vitest';
import { csvField } from '../../../../packages/server/src/modules/groups/audit.ts';

// RFC 4180 for quoting; a leading = + - @ would be run as a formula by spreadsheets.
test.each([
  ['plain words', 'plain words'],
  ['with, comma', '"with, comma"'],
  ['a "word"', '"a ""word"""'],
  ['two\nlines', '"two\nlines"'],
  ['=1+1', "'=1+1"],
  ['@name', "'@name"],
  ['-2, no', `"'-2, no"`],
])('%j becomes %j', (value, field) => {
  expect(csvField(value)).toBe(field);
});
