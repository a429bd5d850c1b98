import { readFileSync } from 'node:fs';

const about: unknown = JSON.parse(readFileSync(new URL('../package.json', import.meta.url), 'utf8'));

/** Version of this installation, as its package says. */
export const version: string = (about as { readonly version: string }).version;
