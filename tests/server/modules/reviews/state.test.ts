import { describe, expect, test } from 'vitest';
import type { ReviewEntity } from '../../../../packages/server/src/modules/reviews/index.ts';
import { endOf, shownName, stateOf } from '../../../../packages/server/src/modules/reviews/state.ts';

const review = (rest: Partial<ReviewEntity> = {}): ReviewEntity =>
  ({
    number: 2,
    email: 'referee@example.org',
    name: 'Dr Referee',
    masked: false,
    until: '2026-12-20',
    openedAt: null,
    withdrawnAt: null,
    returnedAt: null,
    ...rest,
  }) as ReviewEntity;
const noon = new Date('2026-12-01T12:00:00Z');

describe('how a review stands', () => {
  test('invited, opened, expired after its last day, withdrawn; returned counts before all', () => {
    expect(stateOf(review(), noon)).toBe('invited');
    expect(stateOf(review({ openedAt: noon }), noon)).toBe('opened');
    expect(stateOf(review({ until: '2026-11-30' }), noon)).toBe('expired');
    expect(stateOf(review({ withdrawnAt: noon }), noon)).toBe('withdrawn');
    expect(stateOf(review({ withdrawnAt: noon, returnedAt: noon, until: '2026-11-30' }), noon)).toBe(
      'returned',
    );
  });

  test('its link works to the end of its last day', () => {
    const today = review({ until: '2026-12-01' });
    expect(endOf(today) > noon).toBe(true);
    expect(stateOf(today, noon)).toBe('invited');
  });
});

describe('what a reviewer is called', () => {
  test('by name, or by address where none was given; masked by a number alone', () => {
    expect(shownName(review())).toBe('Dr Referee');
    expect(shownName(review({ name: '' }))).toBe('referee@example.org');
    expect(shownName(review({ masked: true }))).toBe('Reviewer 2');
  });
});
