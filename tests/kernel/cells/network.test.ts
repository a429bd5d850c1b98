import { describeNetwork } from '@stillroom/kernel/cells';
import { canonicalText, readNetwork } from '@stillroom/shared/notation';
import { describe, expect, test } from 'vitest';

const described = (text: string) => {
  const { network, complaints } = readNetwork(text);
  expect(complaints.filter(({ severity }) => severity === 'error')).toEqual([]);
  return describeNetwork(network!, canonicalText(text) ?? text);
};

const enzyme = `
E + S <=> ES -> E + P | kf = 0.1 /uM/s, kr = 2 /s, kc = 1.5 /s | binding, then turnover
0 <=> S               | feed = 0.3 uM/s, wash = 0.05 /s
P -> 0                | wash
start E = 1 uM, S = 10 uM
`;

describe('the result of a network cell', () => {
  test('lists what the text says', () => {
    const result = described(enzyme);
    expect(result.species).toEqual(['E', 'S', 'ES', 'P']);
    expect(result.start).toEqual({ E: 1, S: 10 });
    expect(result.constants[0]).toEqual({ name: 'kf', value: 0.1, unit: '/uM/s' });
    expect(result.units).toEqual({ time: 's', amount: 'uM', volume: null });
    expect(result.counts).toEqual({ species: 4, reactions: 6, constants: 5 });
    expect(result.reactions[0]).toEqual({
      label: 'E + S -> ES',
      row: 0,
      from: { E: 1, S: 1 },
      to: { ES: 1 },
      rate: 'kf*E*S',
      note: 'binding, then turnover',
    });
    expect(result.reactions[5]).toMatchObject({
      label: 'P -> 0',
      row: 2,
      from: { P: 1 },
      to: {},
      rate: 'wash*P',
    });
  });

  test('typesets the rate equations, terms in order of the reactions', () => {
    const { equations } = described(enzyme);
    expect(equations.map(({ of }) => of)).toEqual(['E', 'S', 'ES', 'P']);
    expect(equations[1]!.tex).toBe(
      '-\\mathrm{kf} \\, E \\, S + \\mathrm{kr} \\, \\mathrm{ES} + \\mathrm{feed} - \\mathrm{wash} \\, S',
    );
  });

  test('typesets laws, rate rules, powers, indices and Greek letters, and leaves out fixed species', () => {
    const { equations, reactions } = described(`
      2 X[1] -> 3 β  | k1 = 2
      0 -> X[1]      | law = hill(β, K, 2) + (a - 1)/a
      F -> β         | c = 1
      rate Y = -a*(Y + sqrt(β))
      let K = 3
      let a = 2
      fix F = 1
    `);
    expect(equations).toEqual([
      {
        of: 'X[1]',
        tex: '-2 \\, k_{1} \\, {X_{1}}^{2} + \\left(\\frac{{\\beta}^{2}}{{K}^{2} + {\\beta}^{2}} + \\frac{a - 1}{a}\\right)',
      },
      { of: 'β', tex: '3 \\, k_{1} \\, {X_{1}}^{2} + c \\, F' },
      { of: 'Y', tex: '-a \\, \\left(Y + \\sqrt{\\beta}\\right)' },
    ]);
    expect(reactions[0]!.rate).toBe('k1*X[1]^2');
    expect(reactions[1]!.rate).toBe('hill(β, K, 2) + (a - 1)/a');
  });

  test('a reaction across compartments shows its share of the volume', () => {
    const { equations } = described(`
      A -> B | law = k*A
      let k = 6
      volume cell = 2
      volume nucleus = 0.5
      in nucleus: B
    `);
    expect(equations[1]!.tex).toBe('\\frac{1}{\\mathrm{nucleus}} \\, k \\, A');
  });

  test('beyond 20,000 reactions the lists are left out', () => {
    const result = described('[i = 1..20001] X[i] -> 0 | k = 1');
    expect(result.listed).toBe(false);
    expect(result.reactions).toEqual([]);
    expect(result.counts.reactions).toBe(20001);
  });
});
