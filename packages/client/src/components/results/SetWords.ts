import { type FunctionalComponent, h, type VNodeChild } from 'vue';

/**
 * A letter or a product with a lowered index, or something raised: C_i, v_ij, ∏_{j}, ^{x_i}, ^m. Names of several letters
 * such as few_cells are left alone.
 */
const marked =
  /(?<![\p{L}\p{N}_])([\p{L}∏Σ])_(?:\{([^{}]+)\}|([ijkmn]{2}|[\p{L}\p{N}])(?![\p{L}\p{N}_]))|\^(?:\{([^{}]+)\}|([\p{L}\p{N}])(?![\p{L}\p{N}_]))/gu;

function setWords(words: string): VNodeChild[] {
  const set: VNodeChild[] = [];
  let at = 0;
  for (const found of words.matchAll(marked)) {
    const [whole, letter, low, index, high, power] = found;
    set.push(words.slice(at, found.index));
    if (letter === undefined) set.push(h('sup', setWords(high ?? power ?? '')));
    else set.push(letter, h('sub', setWords(low ?? index ?? '')));
    at = found.index + whole.length;
  }
  set.push(words.slice(at));
  return set;
}

/** A sentence of the engine with its indices lowered and its powers raised. */
export const SetWords: FunctionalComponent<{ words: string }> = ({ words }) => setWords(words);
SetWords.props = ['words'];
