import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { ChangeCount } from '../../../packages/client/src/live/changeCount.ts';

describe('changes kept here only', () => {
  test('a change is pending until its own frame is committed', () => {
    const count = new ChangeCount();
    count.changed();
    count.sent();
    count.changed();
    count.sent();
    expect(count.pending).toBe(2);
    count.kept(1);
    expect(count.pending).toBe(1);
    count.kept(2);
    expect(count.pending).toBe(0);
    expect(count.settled).toBe(true);
  });

  test('an acknowledgement of an earlier frame does not settle a later one', () => {
    const count = new ChangeCount();
    count.changed();
    count.sent();
    count.kept(1);
    count.changed();
    count.sent();
    count.kept(1);
    expect(count.settled).toBe(false);
  });

  test('what was under way when the line broke goes with the first frame of the next connection', () => {
    const count = new ChangeCount();
    for (let i = 0; i < 3; i++) {
      count.changed();
      count.sent();
    }
    count.kept(1);
    count.closed();
    expect(count.pending).toBe(2);
    count.changed();
    count.sent();
    expect(count.pending).toBe(3);
    count.kept(1);
    expect(count.pending).toBe(0);
  });

  test('changes left behind by an earlier page count until they are committed', () => {
    const count = new ChangeCount(4);
    expect(count.pending).toBe(4);
    count.sent();
    count.kept(1);
    expect(count.pending).toBe(0);
  });

  test('no order of events loses or invents a change', () => {
    const event = fc.constantFrom('change', 'send', 'acknowledge', 'close');
    fc.assert(
      fc.property(fc.array(event, { maxLength: 60 }), (events) => {
        const count = new ChangeCount();
        let unsent = 0;
        let frames: number[] = [];
        let acknowledged = 0;
        for (const one of events) {
          if (one === 'change') {
            count.changed();
            unsent += 1;
          } else if (one === 'send') {
            count.sent();
            frames.push(unsent);
            unsent = 0;
          } else if (one === 'acknowledge' && acknowledged < frames.length) {
            acknowledged += 1;
            count.kept(acknowledged);
          } else if (one === 'close') {
            count.closed();
            unsent += frames.slice(acknowledged).reduce((sum, changes) => sum + changes, 0);
            frames = [];
            acknowledged = 0;
          }
          expect(count.pending).toBe(unsent + frames.slice(acknowledged).reduce((a, b) => a + b, 0));
        }
      }),
      { seed: 20261201 },
    );
  });
});
