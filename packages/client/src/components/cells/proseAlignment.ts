interface Word {
  readonly text: string;
  readonly from: number;
  readonly to: number;
}

const wordsOf = (text: string): readonly Word[] =>
  [...text.matchAll(/[\p{L}\p{N}]+/gu)].map(({ 0: word, index }) => ({
    text: word,
    from: index,
    to: index + word.length,
  }));

/** What is in the source and not, or not as words, in what is shown: formulas, woven values, addresses. */
const notShown = /\$\$[^$]*\$\$|\$[^$\n]*\$|=\[[^\n]*?\](?!\])|\]\([^)\n]*\)/gu;
const shownParts = (source: string): string => source.replaceAll(notShown, (part) => ' '.repeat(part.length));

/** How many words of what is shown may stand between two that agree, such as those of a woven value. */
const reach = 24;

/** Words of a source and of its typeset form that are the same, in order. */
function pairs(source: readonly Word[], shown: readonly Word[]): readonly (readonly [Word, Word])[] {
  const found: (readonly [Word, Word])[] = [];
  let at = 0;
  for (const [i, word] of source.entries()) {
    const next = source[i + 1]?.text;
    for (let ahead = 0; ahead < reach; ahead++) {
      const other = shown[at + ahead];
      if (other === undefined) break;
      if (other.text !== word.text) continue;
      // Further on, one word alone may be a chance: the next must agree as well.
      if (ahead > 0 && next !== undefined && shown[at + ahead + 1]?.text !== next) continue;
      found.push([word, other]);
      at += ahead + 1;
      break;
    }
  }
  return found;
}

/**
 * Where places of a Markdown text stand in what it was typeset as, word by word: signs, addresses and formulas are in one
 * and not in the other. What is typed within a word moves with it; elsewhere a place stands at the word before.
 */
export function alignProse(source: string, shown: string): (offset: number) => number {
  const found = pairs(wordsOf(shownParts(source)), wordsOf(shown));
  return (offset) => {
    const at = found.findLastIndex(([word]) => word.from <= offset);
    const pair = found[at];
    if (pair === undefined) return 0;
    const [word, other] = pair;
    const end = found[at + 1]?.[1].from ?? shown.length;
    return offset <= word.to
      ? other.from + (offset - word.from)
      : Math.min(other.to + (offset - word.to), end);
  };
}
