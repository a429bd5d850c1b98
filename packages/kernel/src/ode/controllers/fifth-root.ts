const number = new Float64Array(1);
const words = new Uint32Array(number.buffer);
/** The place of the high word, which holds the exponent. */
const high = new Uint8Array(Uint32Array.of(1).buffer)[0] === 1 ? 1 : 0;

/**
 * The fifth root of a positive normal number, to about 9 digits, from basic operations only: the exponent divided by
 * five as a first guess (after the well-known trick for the inverse square root), then three steps of Newton's method.
 * Step-size control needs it in every step; it is the same on every machine.
 */
export function fifthRoot(x: number): number {
  if (!(x > 1e-300)) return x > 0 ? 1e-60 : 0;
  if (x === Infinity) return x;
  number[0] = x;
  const exponent = words[high]!;
  words[high] = Math.floor(exponent / 5) + 858_120_000;
  words[1 - high] = 0;
  let root = number[0];
  for (let turn = 0; turn < 3; turn++) {
    const square = root * root;
    root = 0.8 * root + (0.2 * x) / (square * square);
  }
  return root;
}
