import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { request } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { brotliCompressSync, brotliDecompressSync, gunzipSync, gzipSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { startTestServer, type TestServer } from '../../support/server.ts';

const folder = mkdtempSync(join(tmpdir(), 'client-'));
const script = `export const words = '${'still'.repeat(500)}';`;
const page = '<!doctype html><meta name="csp-nonce" content="%NONCE%"><div id="app"></div>';

let server: TestServer;
beforeAll(async () => {
  mkdirSync(join(folder, 'assets'));
  writeFileSync(join(folder, 'index.html'), page);
  writeFileSync(join(folder, 'mark.svg'), '<svg xmlns="http://www.w3.org/2000/svg"/>');
  writeFileSync(join(folder, 'assets/index-abc123.js'), script);
  writeFileSync(join(folder, 'assets/index-abc123.js.br'), brotliCompressSync(script));
  writeFileSync(join(folder, 'assets/index-abc123.js.gz'), gzipSync(script));
  server = await startTestServer({ CLIENT_FOLDER: folder });
});
afterAll(async () => {
  await server.stop();
  rmSync(folder, { recursive: true });
});

interface Raw {
  readonly status: number;
  readonly headers: Readonly<Record<string, string | string[] | undefined>>;
  readonly bytes: Buffer;
}

/** Asks without the client's own unpacking and without its tidying of the path. */
function ask(path: string, headers: Record<string, string> = {}): Promise<Raw> {
  const { hostname, port } = new URL(server.url);
  return new Promise((resolve, reject) => {
    const asked = request({ hostname, port, path, headers }, (response) => {
      const chunks: Buffer[] = [];
      response.on('data', (chunk: Buffer) => chunks.push(chunk));
      response.on('end', () =>
        resolve({
          status: response.statusCode ?? 0,
          headers: response.headers,
          bytes: Buffer.concat(chunks),
        }),
      );
    });
    asked.on('error', reject);
    asked.end();
  });
}

describe('assets', () => {
  test('are kept for ever: their name holds a hash of their content', async () => {
    const { status, headers, bytes } = await ask('/assets/index-abc123.js');
    expect(status).toBe(200);
    expect(headers['cache-control']).toBe('public, max-age=31536000, immutable');
    expect(headers['content-type']).toMatch(/^text\/javascript/u);
    expect(bytes.toString()).toBe(script);
  });

  test('come in the best form the browser takes', async () => {
    const best = await ask('/assets/index-abc123.js', { 'accept-encoding': 'gzip, deflate, br' });
    expect(best.headers['content-encoding']).toBe('br');
    expect(best.headers['content-type']).toMatch(/^text\/javascript/u);
    expect(brotliDecompressSync(best.bytes).toString()).toBe(script);
    const good = await ask('/assets/index-abc123.js', { 'accept-encoding': 'gzip' });
    expect(good.headers['content-encoding']).toBe('gzip');
    expect(gunzipSync(good.bytes).toString()).toBe(script);
    const refused = await ask('/assets/index-abc123.js', { 'accept-encoding': 'br;q=0, gzip;q=0' });
    expect(refused.headers['content-encoding']).toBeUndefined();
    expect(refused.headers['vary']).toMatch(/accept-encoding/iu);
  });

  test('without a hash in the name are kept for minutes only', async () => {
    expect((await ask('/mark.svg')).headers['cache-control']).toBe('public, max-age=300');
  });
});

describe('pages', () => {
  test('bear the nonce of their own answer, for every address of the client', async () => {
    for (const path of ['/', '/notebooks/abc', '/index.html']) {
      const { headers, bytes } = await ask(path, { accept: 'text/html' });
      const nonce = /'nonce-([^']+)'/u.exec(String(headers['content-security-policy']))?.[1];
      expect(bytes.toString(), path).toBe(page.replace('%NONCE%', nonce ?? 'none'));
      expect(headers['cache-control']).toBe('no-store');
    }
  });

  test('never show a file from outside the folder', async () => {
    for (const path of [
      '/../../etc/passwd',
      '/assets/../../../etc/passwd',
      '/%2e%2e/%2e%2e/etc/passwd',
      '/..%2f..%2fetc%2fpasswd',
    ]) {
      const { bytes } = await ask(path, { accept: 'text/html' });
      expect(bytes.toString(), path).not.toContain('root:');
    }
  });

  test('are not sent in the place of a missing script', async () => {
    const { status } = await ask('/assets/gone-000000.js', { accept: 'application/javascript' });
    expect(status).toBe(404);
  });
});

describe('upgrades', () => {
  test('to an unknown address are refused, and the server lives on', async () => {
    const { hostname, port } = new URL(server.url);
    const status = await new Promise<number>((resolve, reject) => {
      const asked = request({
        hostname,
        port,
        path: '/nowhere',
        headers: {
          connection: 'Upgrade',
          upgrade: 'websocket',
          'sec-websocket-key': 'dGhlIHNhbXBsZSBub25jZQ==',
          'sec-websocket-version': '13',
        },
      });
      asked.on('response', (response) => resolve(response.statusCode ?? 0));
      asked.on('error', reject);
      asked.end();
    });
    expect(status).toBe(404);
    expect((await ask('/')).status).toBe(200);
  });
});
