import { findWoven, mathAt } from '@stillroom/shared/paths';
import { describe, expect, test } from 'vitest';

const found = (text: string) => findWoven(text).map(({ source, from, to }) => [source, text.slice(from, to)]);

describe('woven values', () => {
  test('stand between =[ and the bracket that closes it', () => {
    expect(found('a =[run1.species["X[3]"][0], last] b =[c1.x]')).toEqual([
      ['run1.species["X[3]"][0], last', '=[run1.species["X[3]"][0], last]'],
      ['c1.x', '=[c1.x]'],
    ]);
  });
  test.each([
    '=[1, 2]',
    '=[]',
    '=[ ]',
    '\\=[run1.x]',
    '`=[run1.x]`',
    '``a ` =[run1.x]``',
    '$x =[a, b]$',
    '$$\nx =[a, b]\n$$',
    '```\n=[run1.x]\n```',
    '~~~~\n=[run1.x]\n~~~\n=[run1.y]\n~~~~',
    '=[run1.x',
    '=[run1\n.x]',
  ])('%j holds none', (text) => expect(found(text)).toEqual([]));
  test('are found after code and mathematics that do not close', () => {
    expect(found('` $5 =[run1.x]')).toEqual([['run1.x', '=[run1.x]']]);
    expect(found('```\ncode\n```\n=[run1.x]')).toEqual([['run1.x', '=[run1.x]']]);
  });
});

describe('mathematics', () => {
  test.each([
    ['$x$', 'x', false],
    ['$a\\$b$', 'a\\$b', false],
    ['$$ x $$', 'x', true],
    ['$a\nb$', 'a\nb', false],
  ])('%j', (text, tex, display) => expect(mathAt(text, 0)).toEqual({ tex, display, to: text.length }));
  test.each(['$5 and $6', '$ x$', '$x $', '$$', '$$ $$', '$a\n\nb$', 'x'])('%j is none', (text) =>
    expect(mathAt(text, 0)).toBeNull(),
  );
});
