import { type NotationReading, readNetwork } from '@stillroom/shared/notation';

/** Readings that are remembered, and the longest text that is. */
const most = 32;
const longestText = 2_000_000;

/**
 * Remembers the networks that were read last: the cells that draw on one network come one after another, and reading it
 * again for each would cost more than many of them.
 */
export class NetworkMemory {
  private readonly readings = new Map<string, NotationReading>();

  /** @param text canonical, so that it stands for the digest of its cell */
  read(text: string): NotationReading {
    const known = this.readings.get(text);
    if (known !== undefined) {
      this.readings.delete(text);
      this.readings.set(text, known);
      return known;
    }
    const reading = readNetwork(text);
    if (text.length <= longestText) this.readings.set(text, reading);
    const [oldest] = this.readings.keys();
    if (this.readings.size > most && oldest !== undefined) this.readings.delete(oldest);
    return reading;
  }
}
