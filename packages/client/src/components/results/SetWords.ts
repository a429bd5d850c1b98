import { type FunctionalComponent, h, type VNodeChild } from 'vue';

/**
 * A letter or a product with a lowered index, something raised, the index of a species: C_i, v_ij, ∏_{j}, ^{x_i}, ^m, X[1]. Names of several letters
 * such as few_cells are left alone.
 */
const marked =
  /(?<![\p{L}\p{N}_])([\p{L}∏Σ])_(?:\{([^{}]+)\}|([ijkmn]{2}|[\p{L}\p{N}])(?![\p{L}\p{N}_]))|\^(?:\{([^{}]+)\}|([\p{L}\p{N}])(?![\p{L}\p{N}_]))|(?<=[\p{L}\p{N}'])\[([^[\]]+)\]/gu;

/** A factor again and again, as a condition on a ring has it: p*p*p is p³. */
const repeated = /(?<![\p{L}\p{N}_*])(\p{L}[\p{L}\p{N}_]*)((?:\*\1(?![\p{L}\p{N}_[])){2,})/gu;
const shortened = (words: string): string =>
  words.replaceAll(
    repeated,
    (_, name: string, rest: string) => `${name}^{${rest.length / (name.length + 1) + 1}}`,
  );

function setWords(words: string): VNodeChild[] {
  const set: VNodeChild[] = [];
  let at = 0;
  for (const found of words.matchAll(marked)) {
    const [whole, letter, low, index, high, power, bracket] = found;
    set.push(words.slice(at, found.index));
    if (bracket !== undefined) set.push(h('sub', bracket));
    else if (letter === undefined) set.push(h('sup', setWords(high ?? power ?? '')));
    else set.push(letter, h('sub', setWords(low ?? index ?? '')));
    at = found.index + whole.length;
  }
  set.push(words.slice(at));
  return set;
}

/** A sentence of the engine with its indices lowered and its powers raised. */
export const SetWords: FunctionalComponent<{ words: string }> = ({ words }) => setWords(shortened(words));
SetWords.props = ['words'];
