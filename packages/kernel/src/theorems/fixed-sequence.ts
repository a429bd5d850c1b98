/** A fixed sequence of numbers in [0, 1) (a linear congruential generator), so that every run is the same. */
export function fixedSequence(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 1103515245 + 12345) % 2147483648;
    return state / 2147483648;
  };
}
