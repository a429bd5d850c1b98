import fc from 'fast-check';
import { parseNetwork } from '@stillroom/shared/notation';
import { expect, test } from 'vitest';

const letters = "abcXYZ019_'".split('');
const name = fc
  .tuple(fc.constantFrom('a', 'X', 'Z'), fc.array(fc.constantFrom(...letters), { maxLength: 40 }))
  .map(([first, rest]) => `${first}${rest.join('')}`);

test('every name is read as it is written, however many came before', () => {
  fc.assert(
    fc.property(fc.array(name, { minLength: 50, maxLength: 200 }), (names) => {
      const { tree } = parseNetwork(names.map((each) => `q_${each} -> 0`).join('\n'));
      const read = tree.lines.map((line) =>
        line.kind === 'row' ? line.sides[0]?.terms[0]?.species.name : null,
      );
      expect(read).toEqual(names.map((each) => `q_${each}`));
    }),
    { seed: 7, numRuns: 100 },
  );
});

test('names stay apart when more come than are remembered', () => {
  const count = 140_000;
  const { tree } = parseNetwork(Array.from({ length: count }, (_, i) => `w${i} -> w${i + 1}`).join('\n'));
  const wrong = tree.lines.findIndex(
    (line, i) => line.kind !== 'row' || line.sides[0]?.terms[0]?.species.name !== `w${i}`,
  );
  expect(wrong).toBe(-1);
});
