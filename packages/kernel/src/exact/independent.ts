import { DenseCore } from './modular/dense-core.ts';
import { primeField } from './modular/field.ts';

/**
 * Picks from vectors, in order, those that are independent of the ones picked before, modulo a prime below 2^22. What is
 * picked is independent over the rationals too; a vector may be passed over by an unlucky prime, so callers that need a
 * whole basis append vectors that complete it. Returns indices.
 */
export function independentSelection(vectors: Iterable<readonly bigint[]>, width: number): number[] {
  const field = primeField(0);
  const p = BigInt(field.p);
  const space = new DenseCore(width, field);
  const picked: number[] = [];
  let index = 0;
  for (const vector of vectors) {
    if (space.rank === width) break;
    const residues = Float64Array.from(vector, (entry) => Number(((entry % p) + p) % p));
    if (space.add(residues, index)) picked.push(index);
    index++;
  }
  return picked;
}
