import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { extname, join } from 'node:path';
import { brotliCompressSync, constants, gzipSync } from 'node:zlib';

const texts = new Set(['.js', '.css', '.svg', '.json', '.html', '.txt', '.wasm']);

/** Writes a brotli and a gzip form beside every text of a folder, where that saves anything. */
export function precompress(folder) {
  for (const entry of readdirSync(folder, { recursive: true, withFileTypes: true })) {
    if (!entry.isFile() || !texts.has(extname(entry.name)) || entry.name === 'index.html') continue;
    const file = join(entry.parentPath ?? entry.path, entry.name);
    const bytes = readFileSync(file);
    if (bytes.length < 1024) continue;
    writeFileSync(`${file}.gz`, gzipSync(bytes, { level: 9 }));
    const params = { [constants.BROTLI_PARAM_QUALITY]: 10, [constants.BROTLI_PARAM_SIZE_HINT]: bytes.length };
    writeFileSync(`${file}.br`, brotliCompressSync(bytes, { params }));
  }
}
