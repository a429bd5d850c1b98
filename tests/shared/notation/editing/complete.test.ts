import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { completionsAt } from '@stillroom/shared/notation';
import { anyText, networkText, seeded } from '../texts.ts';

const known = 'E + S <=> ES -> E + P | kf = 0.1 /uM/s, kr, kc | turnover\nlet Vmax = 3\n';

/** What is offered where `^` stands in the text after the known lines: kinds and labels. */
function offered(written: string): { labels: string[]; kinds: Set<string>; from: number } {
  const at = known.length + written.indexOf('^');
  const { from, options } = completionsAt(known + written.replace('^', ''), at);
  return {
    labels: options.map(({ label }) => label),
    kinds: new Set(options.map(({ kind }) => kind)),
    from: from - known.length,
  };
}

describe('completion', () => {
  test('offers species and statements at the beginning of a line', () => {
    expect(offered('^').labels).toEqual(expect.arrayContaining(['E', 'S', 'ES', 'P', 'start', 'event']));
    expect(offered('st^').from).toBe(0);
  });

  test('offers species within a reaction, but not the word that is being typed', () => {
    expect(offered('P + Subs^ -> E')).toEqual({
      labels: ['E', 'S', 'ES', 'P'],
      kinds: new Set(['species']),
      from: 4,
    });
  });

  test('offers constants and law in the second column', () => {
    expect(offered('P -> 0 | ^').labels).toEqual(['kf', 'kr', 'kc', 'Vmax', 'law', 'net']);
  });

  test('offers species, constants and functions in a value', () => {
    const { labels } = offered('P -> 0 | law = Vm^');
    expect(labels).toEqual(expect.arrayContaining(['S', 'Vmax', 'exp', 'hill', 'sum', 't']));
    expect(offered('let a = ^').labels).toEqual(expect.arrayContaining(['S', 'Vmax', 'if']));
  });

  test('offers units after a number', () => {
    expect(offered('P -> 0 | kd = 2 ^').kinds).toEqual(new Set(['unit']));
    expect(offered('P -> 0 | kd = 2 /^').labels).toContain('uM');
    expect(offered('start E = 3 u^').labels).toContain('uM');
    expect(offered('start E = 3 u^').from).toBe(12);
  });

  test('offers species as what starts, is fixed or has a rate', () => {
    expect(offered('start ^').kinds).toEqual(new Set(['species']));
    expect(offered('start E = 3 uM, ^').kinds).toEqual(new Set(['species']));
  });

  test('offers nothing in notes and comments', () => {
    expect(offered('P -> 0 | kf | E^').labels).toEqual([]);
    expect(offered('# E^').labels).toEqual([]);
  });

  test('answers at any offset of any text', () => {
    fc.assert(
      fc.property(fc.oneof(anyText, networkText), fc.nat(), (text, place) => {
        const at = place % (text.length + 1);
        const { from, options } = completionsAt(text, at);
        expect(from).toBeLessThanOrEqual(at);
        expect(from).toBeGreaterThanOrEqual(0);
        expect(new Set(options.map(({ label, kind }) => `${kind} ${label}`)).size).toBe(options.length);
      }),
      seeded,
    );
  });
});
