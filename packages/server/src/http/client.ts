import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { extname, join, relative } from 'node:path';
import { Router, type Request, type Response } from 'express';

const encodings = [
  { name: 'br', ending: '.br' },
  { name: 'gzip', ending: '.gz' },
] as const;

/** Files under assets/ bear a hash of their content in their name. */
const aYear = 'public, max-age=31536000, immutable';
const aMoment = 'public, max-age=300';

/**
 * The built client: assets, compressed beforehand where the browser takes that, and for every other path the page,
 * rendered with the nonce of this answer and never stored. Only files found at start are served.
 */
export function serveClient(folder: string): Router {
  const files = listFiles(folder);
  const page = readPage(folder);
  const router = Router();
  router.get('/{*path}', (request, response, next) => {
    const file = request.path.slice(1);
    if (files.has(file) && file !== 'index.html') return sendAsset(folder, files, file, request, response);
    if (extname(file) !== '' && !request.accepts('html')) return next();
    response
      .set('Cache-Control', 'no-store')
      .type('html')
      .send(page.replaceAll('%NONCE%', String(response.locals['nonce'])));
  });
  return router;
}

function sendAsset(
  folder: string,
  files: ReadonlySet<string>,
  file: string,
  request: Request,
  response: Response,
): void {
  response.vary('Accept-Encoding');
  const encoding = encodings.find(
    ({ name, ending }) => files.has(file + ending) && request.acceptsEncodings(name) === name,
  );
  if (encoding !== undefined) response.set('Content-Encoding', encoding.name);
  response.type(extname(file));
  response.sendFile(file + (encoding?.ending ?? ''), {
    root: folder,
    cacheControl: false,
    headers: { 'Cache-Control': file.startsWith('assets/') ? aYear : aMoment },
  });
}

function listFiles(folder: string): ReadonlySet<string> {
  if (!existsSync(folder)) return new Set();
  const entries = readdirSync(folder, { recursive: true, withFileTypes: true });
  return new Set(
    entries
      .filter((entry) => entry.isFile())
      .map((entry) => relative(folder, join(entry.parentPath, entry.name))),
  );
}

function readPage(folder: string): string {
  const file = join(folder, 'index.html');
  if (existsSync(file)) return readFileSync(file, 'utf8');
  return '<!doctype html><title>Stillroom</title><p>The pages of Stillroom are not built yet: run npm start.</p>';
}
