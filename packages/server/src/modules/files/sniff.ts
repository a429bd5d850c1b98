const ascii = (bytes: Uint8Array, from: number, to: number): string =>
  String.fromCharCode(...bytes.subarray(from, to));

const kinds: readonly { readonly type: string; readonly is: (bytes: Uint8Array) => boolean }[] = [
  { type: 'image/png', is: (bytes) => ascii(bytes, 0, 8) === '\x89PNG\r\n\x1a\n' },
  { type: 'image/jpeg', is: (bytes) => ascii(bytes, 0, 3) === '\xff\xd8\xff' },
  { type: 'image/gif', is: (bytes) => /^GIF8[79]a$/u.test(ascii(bytes, 0, 6)) },
  { type: 'image/webp', is: (bytes) => ascii(bytes, 0, 4) === 'RIFF' && ascii(bytes, 8, 12) === 'WEBP' },
  {
    type: 'image/avif',
    is: (bytes) => ascii(bytes, 4, 8) === 'ftyp' && /^avi[fs]$/u.test(ascii(bytes, 8, 12)),
  },
];

/**
 * The picture type its first bytes show, or null. What the upload calls itself does not count. SVG is none of these:
 * it can hold script.
 */
export function sniffPicture(bytes: Uint8Array): string | null {
  return kinds.find(({ is }) => is(bytes))?.type ?? null;
}
