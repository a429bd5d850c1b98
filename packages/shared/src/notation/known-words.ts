/** So many different words are remembered; then all are forgotten. A text of a million letters has fewer. */
const LIMIT = 1 << 17;
/** Longer words are rare and are not remembered. */
export const LONGEST_KNOWN = 24;

/**
 * The words of texts, each kept once: a name comes up in many rows, and as one and the same string it is found in every
 * table by its address. It changes nothing but the time that reading takes.
 */
class KnownWords {
  /** Open addressing: number + 1 of a word, 0 for an empty slot; at most half full. */
  private slots = new Int32Array(4096);
  private words: string[] = [];
  private hashes: number[] = [];

  /** The word that stands at `from`..`to` of the text and has this hash, as the one string that it always is. */
  at(text: string, from: number, to: number, hash: number): string {
    let slot = (hash ^ (hash >>> 15)) & (this.slots.length - 1);
    for (;;) {
      const number = this.slots[slot] as number;
      if (number === 0) break;
      const word = this.words[number - 1] as string;
      if (this.hashes[number - 1] === hash && equals(word, text, from, to)) return word;
      slot = (slot + 1) & (this.slots.length - 1);
    }
    return this.keep(copyOf(text, from, to), hash, slot);
  }

  private keep(word: string, hash: number, slot: number): string {
    if (this.words.length >= LIMIT) {
      this.words = [];
      this.hashes = [];
      this.slots = new Int32Array(4096);
      return word;
    }
    this.words.push(word);
    this.hashes.push(hash);
    this.slots[slot] = this.words.length;
    if (this.words.length * 2 > this.slots.length) this.grow();
    return word;
  }

  private grow(): void {
    const slots = new Int32Array(this.slots.length * 2);
    const mask = slots.length - 1;
    for (let i = 0; i < this.hashes.length; i += 1) {
      const hash = this.hashes[i] as number;
      let slot = (hash ^ (hash >>> 15)) & mask;
      while (slots[slot] !== 0) slot = (slot + 1) & mask;
      slots[slot] = i + 1;
    }
    this.slots = slots;
  }
}

/** The word as a string of its own: a slice may hold on to the whole text that it is cut from. */
function copyOf(text: string, from: number, to: number): string {
  if (to - from < 8) return text.slice(from, to);
  const codes: number[] = [];
  for (let i = from; i < to; i += 1) codes.push(text.charCodeAt(i));
  return String.fromCharCode(...codes);
}

function equals(word: string, text: string, from: number, to: number): boolean {
  if (word.length !== to - from) return false;
  for (let i = 0; i < word.length; i += 1) if (word.charCodeAt(i) !== text.charCodeAt(from + i)) return false;
  return true;
}

export const knownWords = new KnownWords();

/** The hash of no letters yet (FNV-1a, Fowler, Noll and Vo 1991), and with one letter more. */
export const EMPTY_HASH = 0x811c9dc5 | 0;
export const hashWith = (hash: number, code: number): number => Math.imul(hash ^ code, 0x01000193);
