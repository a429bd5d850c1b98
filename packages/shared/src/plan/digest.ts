import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';
import canonicalize from 'canonicalize';

/**
 * "sha256:…" of the RFC 8785 (JSON Canonicalization Scheme) text of a value. The value must be JSON: finite numbers,
 * well-formed strings, no cycles; anything else throws.
 */
export function digestOf(value: unknown): string {
  const text = canonicalize(value);
  if (text === undefined) throw new TypeError('Only JSON has a digest.');
  return `sha256:${bytesToHex(sha256(utf8ToBytes(text)))}`;
}
