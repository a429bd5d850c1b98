import { describe, expect, test } from 'vitest';
import { fifthRoot } from '../../../../packages/kernel/src/ode/controllers/fifth-root.ts';
import { methods } from '@stillroom/kernel/ode';

test('the fifth root is right over the whole range', () => {
  for (let exponent = -299; exponent < 308; exponent += 0.37) {
    const x = 10 ** exponent;
    const root = fifthRoot(x);
    expect(Math.abs(root ** 5 / x - 1)).toBeLessThan(1e-8);
  }
  expect(fifthRoot(0)).toBe(0);
  expect(fifthRoot(Infinity)).toBe(Infinity);
});

describe.each(Object.values(methods).map((method) => [method.name, method] as const))(
  'step control of %s',
  (_, method) => {
    test('longer steps after small errors, shorter ones after large, within bounds', () => {
      const controller = method.controller();
      expect(controller.accept(1, 1e-8)).toBeGreaterThan(1);
      expect(controller.accept(1, 1e-8)).toBeLessThanOrEqual(10);
      expect(controller.reject(1, 50)).toBeLessThan(1);
      expect(controller.reject(1, 1e30)).toBeCloseTo(0.2, 12);
      expect(controller.accept(1, 1e-8)).toBeLessThanOrEqual(1);
    });

    test('a steady error just below 1 keeps the step about as it is', () => {
      const controller = method.controller();
      let h = 1;
      for (let i = 0; i < 5; i++) h = controller.accept(h, 0.5);
      expect(h).toBeGreaterThan(0.5);
      expect(h).toBeLessThan(2);
    });
  },
);
