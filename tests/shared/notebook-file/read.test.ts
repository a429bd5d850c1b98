import {
  contentOfFile,
  notebookFileOf,
  readNotebookFile,
  writeNotebookFile,
} from '@stillroom/shared/notebook-file';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';

const cells = [{ id: 'c1', kind: 'claim', name: 'a', text: '1 == 1', settings: {}, held: false }];
const file = (rest: object) =>
  JSON.stringify({ format: 'stillroom-notebook/1', title: 'T', subject: 'none', cells, ...rest });
const words = (text: string) => {
  const read = readNotebookFile(text);
  return read.ok ? '' : read.message;
};

test('what is left out is filled in', () => {
  const read = readNotebookFile(
    '\uFEFF{"format":"stillroom-notebook/1","cells":[{"kind":"prose"},{"kind":"claim","name":"a","id":"c1"}]}',
  );
  expect(read).toEqual({
    ok: true,
    file: {
      format: 'stillroom-notebook/1',
      title: '',
      subject: 'none',
      cells: [
        { id: 'c2', kind: 'prose', name: '', text: '', settings: {}, held: false },
        { id: 'c1', kind: 'claim', name: 'a', text: '', settings: {}, held: false },
      ],
    },
  });
});

describe('one sentence for each fault', () => {
  test.each([
    [
      '{"a": 1,}',
      'The file is not JSON: line 1, column 9: "}" stands where JSON has a key in double quotes.',
    ],
    [
      file({ format: 'other/1' }),
      'The file is no notebook: a notebook begins with "format": "stillroom-notebook/1".',
    ],
    [file({ cells: 3 }), 'The file has no list of cells under "cells".'],
    [
      file({ subject: 'cooking' }),
      'The file needs one of none, clinical, public health, process safety, environment under "subject", not "cooking".',
    ],
    [
      file({ cells: [{ ...cells[0], settings: [] }] }),
      'The file needs an object under "cells[0].settings", not [].',
    ],
    [
      file({ cells: [{ ...cells[0], held: 'yes' }] }),
      'The file needs true or false under "cells[0].held", not "yes".',
    ],
    [file({ cells: [{ ...cells[0], name: '' }] }), 'Cell 1 of the file (claim) has no name.'],
    [
      file({ cells: [...cells, { ...cells[0], name: 'b' }] }),
      'Cells 1 and 2 of the file both have the id "c1".',
    ],
    [
      file({ cells: Array.from({ length: 1001 }, () => cells[0]) }),
      'The file has 1001 cells; a notebook holds at most 1000.',
    ],
    [file({ cells: [null] }), 'The file needs an object under "cells[0]", not null.'],
  ])('%s', (text, message) => expect(words(text)).toBe(message));

  test('no text whatever makes the reader throw', () => {
    fc.assert(
      fc.property(fc.oneof(fc.string(), fc.json()), (text) => typeof words(text) === 'string'),
      { seed: 20261201 },
    );
  });
});

test('a notebook goes into a file and comes back', () => {
  const content = {
    title: 'Ring',
    subject: 'public health' as const,
    cells: [
      { id: 'x', kind: 'prose' as const, name: '', text: 'ä\n', settings: {}, held: null },
      {
        id: 'y',
        kind: 'plot' as const,
        name: 'p',
        text: '',
        settings: { draw: [] },
        held: { by: 'me', at: 'then' },
      },
    ],
  };
  const read = readNotebookFile(writeNotebookFile(notebookFileOf(content)));
  expect(read.ok && contentOfFile(read.file, { by: 'me', at: 'then' })).toEqual(content);
});
