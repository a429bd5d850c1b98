import { describe, expect, test } from 'vitest';
import { expectSilence, failing, judge } from '../../support/verdicts.ts';

const id = 'robust-extinction';

describe('extinction in counts beside robust concentrations', () => {
  test('toy network with conserved counts A + B -> 2 B, B -> A (Anderson, Enciso, Johnston 2014)', () => {
    const verdict = judge(id, 'A + B -> 2 B; B -> A');
    expect(verdict.applies).toBe('yes');
    expect(verdict.conclusion).toContain(
      'with probability one there is a last reaction out of a non-terminal complex (A + B, B)',
    );
  });

  test('isocitrate dehydrogenase: kinase and phosphatase in one enzyme (Anderson, Enciso, Johnston 2014)', () => {
    expect(judge(id, 'E + Ip <=> EIp; EIp -> E + I; EIp + I <=> EIpI; EIpI -> EIp + Ip').applies).toBe('yes');
  });

  test('an open network is not covered, although B = 0 is absorbing: "no" claims nothing', () => {
    const verdict = judge(id, 'A + B -> 2 B; B -> 0; 0 -> A');
    expectSilence(verdict, /never stop|goes? on for ever|nothing dies/);
    expect(failing(verdict)).toEqual([
      'The network is conservative: some conservation law has a positive coefficient for every species.',
    ]);
  });

  test('fractional coefficients have no counts', () => {
    expect(judge(id, 'A + B -> 3/2 B; B -> A').applies).toBe('no');
  });
});
