import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { LinearCondition, LinearProgramme } from '@stillroom/kernel/exact';
import { solveLinear } from '@stillroom/kernel/exact';

/** Checks an outcome by substitution only: a solution meets every condition, a Farkas vector contradicts them. */
function proves(programme: LinearProgramme): 'feasible' | 'infeasible' {
  const outcome = solveLinear(programme);
  const isFree = (variable: number): boolean => programme.free?.(variable) ?? false;
  if (outcome.kind === 'feasible') {
    expect(outcome.denominator > 0n).toBe(true);
    outcome.values.forEach((value, k) => expect(isFree(k) || value >= 0n).toBe(true));
    for (const { terms, relation, right } of programme.conditions) {
      const left = terms.reduce(
        (sum, [variable, coefficient]) => sum + coefficient * outcome.values[variable]!,
        0n,
      );
      expect(
        relation === '=' ? left === right * outcome.denominator : left >= right * outcome.denominator,
      ).toBe(true);
    }
    return 'feasible';
  }
  if (outcome.kind === 'unfinished') throw new Error('the pivot limit was reached');
  const combined = Array.from({ length: programme.variables }, () => 0n);
  let right = 0n;
  programme.conditions.forEach((condition, i) => {
    const multiplier = outcome.multipliers[i]!;
    expect(condition.relation === '=' || multiplier >= 0n).toBe(true);
    right += multiplier * condition.right;
    for (const [variable, coefficient] of condition.terms) combined[variable]! += multiplier * coefficient;
  });
  combined.forEach((sum, k) => expect(isFree(k) ? sum === 0n : sum <= 0n).toBe(true));
  expect(right > 0n).toBe(true);
  return 'infeasible';
}

const condition = (coefficients: number[], relation: '=' | '>=', right: number): LinearCondition => ({
  terms: coefficients.map((coefficient, k) => [k, BigInt(coefficient)] as const),
  relation,
  right: BigInt(right),
});

describe('exact linear programmes', () => {
  test('finds a solution and a contradiction', () => {
    expect(
      proves({ variables: 2, conditions: [condition([1, 1], '=', 3), condition([1, -1], '>=', 1)] }),
    ).toBe('feasible');
    expect(proves({ variables: 2, conditions: [condition([1, 1], '=', -3)] })).toBe('infeasible');
    expect(proves({ variables: 1, free: () => true, conditions: [condition([1], '=', -3)] })).toBe(
      'feasible',
    );
  });

  test('does not cycle on the example of Beale (1955), here as a bounded programme with its optimum as a condition', () => {
    // max 3/4 x4 − 20 x5 + 1/2 x6 − 6 x7 is 5/4; asking for it is feasible, asking for more is not.
    const rows = (target: number): LinearCondition[] => [
      condition([-1, 32, 4, -36], '>=', 0),
      condition([-1, 24, 1, -6], '>=', 0),
      condition([0, 0, -1, 0], '>=', -1),
      condition([3, -80, 2, -24], '>=', target),
    ];
    expect(proves({ variables: 4, conditions: rows(5) })).toBe('feasible');
    expect(proves({ variables: 4, conditions: rows(6) })).toBe('infeasible');
  });

  test('every outcome on random programmes is proven by substitution, also with long numbers', () => {
    const entry = fc.oneof(
      { weight: 6, arbitrary: fc.integer({ min: -3, max: 3 }) },
      fc.integer({ min: -1000000007, max: 1000000007 }),
    );
    const seen = { feasible: 0, infeasible: 0 };
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 6 }).chain((variables) =>
          fc.record({
            variables: fc.constant(variables),
            free: fc.array(fc.boolean(), { minLength: variables, maxLength: variables }),
            rows: fc.array(
              fc.record({
                coefficients: fc.array(entry, { minLength: variables, maxLength: variables }),
                relation: fc.constantFrom('=' as const, '>=' as const),
                right: fc.integer({ min: -5, max: 5 }),
              }),
              { maxLength: 7 },
            ),
          }),
        ),
        ({ variables, free, rows }) => {
          const kind = proves({
            variables,
            free: (k) => free[k]!,
            conditions: rows.map((row) => condition(row.coefficients, row.relation, row.right)),
          });
          seen[kind]++;
        },
      ),
      { seed: 20251201, numRuns: 600 },
    );
    expect(seen.feasible).toBeGreaterThan(50);
    expect(seen.infeasible).toBeGreaterThan(50);
  });
});
