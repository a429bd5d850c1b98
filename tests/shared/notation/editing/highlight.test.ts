import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { highlightLine } from '@stillroom/shared/notation';
import { anyText, networkText, seeded } from '../texts.ts';

/** `style:word` for each coloured stretch. */
const painted = (line: string, column?: number) =>
  highlightLine(line, column).map(({ from, to, style }) => `${style}:${line.slice(from, to)}`);

describe('highlighting a line', () => {
  test('a row', () => {
    expect(painted('2 E + S <=> ES | kf = 0.1 /uM/s, law = exp(S) | binding | more # why')).toEqual([
      ...['number:2', 'species:E', 'operator:+', 'species:S', 'arrow:<=>', 'species:ES', 'bar:|'],
      ...[
        'name:kf',
        'operator:=',
        'number:0.1',
        'unit:/uM/s',
        'operator:,',
        'keyword:law',
        'operator:=',
        'keyword:exp',
      ],
      ...[
        'operator:(',
        'name:S',
        'operator:)',
        'bar:|',
        'note:binding',
        'note:|',
        'note:more',
        'comment:# why',
      ],
    ]);
  });

  test('a family', () => {
    expect(painted('[i = 1..L where i > 2] X[i] → 0')).toEqual([
      ...[
        'operator:[',
        'name:i',
        'operator:=',
        'number:1',
        'operator:..',
        'name:L',
        'keyword:where',
        'name:i',
      ],
      ...[
        'operator:>',
        'number:2',
        'operator:]',
        'species:X',
        'operator:[',
        'name:i',
        'operator:]',
        'arrow:→',
        'number:0',
      ],
    ]);
  });

  test('statements', () => {
    expect(painted('start X[i] = 2 uM for i = 1..L, B = 3')).toEqual([
      ...[
        'keyword:start',
        'species:X',
        'operator:[',
        'name:i',
        'operator:]',
        'operator:=',
        'number:2',
        'unit:uM',
      ],
      ...[
        'keyword:for',
        'name:i',
        'operator:=',
        'number:1',
        'operator:..',
        'name:L',
        'operator:,',
        'species:B',
      ],
      ...['operator:=', 'number:3'],
    ]);
    expect(painted('let a = (b + 1) /s')).toContain('unit:/s');
  });

  test('what means nothing, and a line that goes on', () => {
    expect(painted('A § B')).toEqual(['species:A', 'error:§', 'species:B']);
    expect(painted('q = 3 | a note', 1)).toEqual([
      'name:q',
      'operator:=',
      'number:3',
      'bar:|',
      'note:a note',
    ]);
  });

  test('stretches are in order, apart and inside the line, whatever the line', () => {
    fc.assert(
      fc.property(fc.oneof(anyText, networkText), fc.nat(2), (text, column) => {
        for (const line of text.split(/\r\n|\r|\n/)) {
          let last = 0;
          for (const { from, to } of highlightLine(line, column)) {
            expect(from).toBeGreaterThanOrEqual(last);
            expect(to).toBeGreaterThan(from);
            last = to;
          }
          expect(last).toBeLessThanOrEqual(line.length);
        }
      }),
      seeded,
    );
  });
});
