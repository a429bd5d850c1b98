import { digestOf } from '@stillroom/shared/plan';
import { describe, expect, test } from 'vitest';
import {
  type RecordContent,
  recordFileText,
  recordFormat,
  sealContent,
} from '../../../../packages/server/src/modules/records/content.ts';

const content: RecordContent = {
  format: recordFormat,
  group: { id: 'g', name: 'Bräuhaus “Nord”' },
  number: 3,
  notebook: 'n',
  title: 'Diacetyl rest',
  subject: 'none',
  authors: ['Ada'],
  frozenAt: '2026-12-01T10:00:00.000Z',
  frozenBy: 'Ada',
  engine: '1',
  reasons: {},
  cells: [],
};

describe('the content of a record', () => {
  test('is digested by SHA-256 of its RFC 8785 text', () => {
    const { text, digest } = sealContent(content);
    expect(digest).toBe(digestOf(content));
    expect(JSON.parse(text)).toEqual(content);
  });

  test('has another digest as soon as anything in it differs', () => {
    const { digest } = sealContent(content);
    for (const change of [{ title: 'Diacetyl  rest' }, { number: 4 }, { authors: ['Ada', 'Ben'] }])
      expect(sealContent({ ...content, ...change }).digest).not.toBe(digest);
  });

  test('makes a file from which the digest can be checked', () => {
    const { text, digest } = sealContent(content);
    const { digest: written, ...rest } = JSON.parse(recordFileText(digest, text)) as { digest: string };
    expect(written).toBe(digest);
    expect(digestOf(rest)).toBe(digest);
  });
});
