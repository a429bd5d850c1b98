import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { keepPicture, picturesAt } from '../../../../packages/server/src/modules/files/index.ts';
import { sniffPicture } from '../../../../packages/server/src/modules/files/sniff.ts';
import { startTestServer, type TestServer } from '../../../support/server.ts';

const png = Buffer.from('89504e470d0a1a0a0000000d49484452', 'hex');
const samples: readonly (readonly [string, Buffer, string | null])[] = [
  ['PNG', png, 'image/png'],
  ['JPEG', Buffer.from('ffd8ffe000104a464946', 'hex'), 'image/jpeg'],
  ['GIF', Buffer.from('GIF89a....'), 'image/gif'],
  ['WebP', Buffer.from('RIFF\x10\0\0\0WEBPVP8 '), 'image/webp'],
  ['AVIF', Buffer.from('\0\0\0\x20ftypavif\0\0\0\0'), 'image/avif'],
  [
    'SVG with a script',
    Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script>1</script></svg>'),
    null,
  ],
  ['a page', Buffer.from('<!doctype html><script>1</script>'), null],
  ['a page that begins like a picture', Buffer.from('GIF<script>1</script>'), null],
  ['a WAV file', Buffer.from('RIFF\x10\0\0\0WAVEfmt '), null],
  ['an MP4 film', Buffer.from('\0\0\0\x20ftypisom\0\0\0\0'), null],
  ['nothing', Buffer.alloc(0), null],
];

describe('what an upload is', () => {
  test.each(samples)('%s', (_name, bytes, type) => {
    expect(sniffPicture(bytes)).toBe(type);
  });
});

describe('keeping pictures', () => {
  let server: TestServer;
  beforeAll(async () => {
    server = await startTestServer();
  });
  afterAll(() => server.stop());

  test('the same bytes are kept once, and seen only where they were put', async () => {
    const { manager } = server.services.database;
    const [here, there, nowhere] = [randomUUID(), randomUUID(), randomUUID()];
    const first = await keepPicture(manager, png, here);
    const second = await keepPicture(manager, png, there);
    expect(second).toEqual(first);
    expect(await server.sql('select digest from picture')).toHaveLength(1);
    expect(await picturesAt(manager, here)).toEqual([first.digest]);
    expect(await picturesAt(manager, nowhere)).toEqual([]);
  });

  test('what is no picture is refused with a remedy', async () => {
    const { manager } = server.services.database;
    await expect(keepPicture(manager, Buffer.from('<svg/>'), randomUUID())).rejects.toMatchObject({
      id: 'invalid',
      details: { hint: expect.stringContaining('PNG') as string },
    });
  });
});
