import { readNetwork } from '@stillroom/shared/notation';
import { expect, test } from 'vitest';
import { notationLessons } from '../../../../packages/client/src/components/help/lessons.ts';

test.each(notationLessons.filter(({ id }) => id !== 'faults'))(
  'the example of the lesson $id reads without complaint',
  ({ example }) => {
    expect(readNetwork(example).complaints).toEqual([]);
  },
);

test('the lesson on faults shows one that can be repaired', () => {
  const { complaints } = readNetwork(notationLessons.find(({ id }) => id === 'faults')?.example ?? '');
  expect(complaints.map(({ repairs }) => repairs.map(({ label }) => label))).toEqual([['Make it 2 /s']]);
});
