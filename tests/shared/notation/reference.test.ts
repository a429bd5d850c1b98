import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { canonicalText, parseNetwork, printNetwork } from '@stillroom/shared/notation';
import { complexTexts, networkOf, reactionTexts } from './elaborate/reading.ts';

/*
 * tests/reference/structure.json: networks of the literature with the lists of species, complexes and reactions that a
 * program outside this project made of them; verdicts.json: further texts. Their reactions are separated by semicolons.
 */
interface Entry {
  readonly id: string;
  readonly text: string;
  readonly oracle?: {
    readonly species: readonly string[];
    readonly complexes: readonly string[];
    readonly reactions: readonly (readonly [string, string])[];
  };
}

const entriesOf = (name: string): Entry[] =>
  (
    JSON.parse(readFileSync(new URL(`../../reference/${name}.json`, import.meta.url), 'utf8')) as {
      networks: Entry[];
    }
  ).networks;

const lines = ({ text }: Entry) => `${text.split(';').join('\n')}\n`;

describe('networks of the literature', () => {
  test.each(entriesOf('structure').map((entry): [string, Entry] => [entry.id, entry]))(
    '%s: species, complexes and reactions are those of the table, in its order',
    (_, entry) => {
      const network = networkOf(lines(entry));
      expect(network.species).toEqual(entry.oracle?.species);
      expect(complexTexts(network).map(sorted)).toEqual(entry.oracle?.complexes.map(sorted));
      const arrows = reactionTexts(network).map((text) => text.split(' | ')[0]?.split(' -> ').map(sorted));
      expect(arrows).toEqual(entry.oracle?.reactions.map((sides) => sides.map(sorted)));
    },
  );

  test.each(
    [...entriesOf('structure'), ...entriesOf('verdicts')].map((entry): [string, Entry] => [entry.id, entry]),
  )('%s is printed and read again', (_, entry) => {
    const printed = printNetwork(parseNetwork(lines(entry)).tree);
    expect(networkOf(printed)).toEqual(networkOf(lines(entry)));
    expect(canonicalText(printed)).toBe(canonicalText(lines(entry)));
  });
});

/** A complex with its terms in alphabetical order: the table lists them as they come, we by number of species. */
function sorted(complex: string): string {
  return complex.split(' + ').sort().join(' + ');
}
