import { expect, test } from 'vitest';
import { storableJson, storableText } from '../../../packages/server/src/database/storable.ts';

test('characters that PostgreSQL cannot hold become the sign for what could not be read', () => {
  expect(storableText('a\0b')).toBe('a\uFFFDb');
  const words = ['a\0b', '\uD800', '\uDFFFx', '😀', '\\u0000', '\\\0'];
  expect(JSON.parse(storableJson(words))).toEqual([
    'a\uFFFDb',
    '\uFFFD',
    '\uFFFDx',
    '😀',
    '\\u0000',
    '\\\uFFFD',
  ]);
});
