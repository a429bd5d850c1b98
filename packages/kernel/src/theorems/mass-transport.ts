import type { Hypothesis } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { factorisedRates } from './counts/factorised-rates.ts';
import { sources } from './sources.ts';
import type { Judgement, Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Spitzer 1970; Evans, Majumdar, Zia 2004, 2006; Greenblatt, Lebowitz 2006; Evans, Hanney 2005. */
export const massTransport: Theorem = {
  id: 'mass-transport',
  title: 'Factorised law of mass transport',
  statement:
    'In continuous time, if m units leave site i for site j at rate v_ij(m) w_i(n − m)/w_i(n), and some z > 0 has Σ_j v_ij(m) z_i^m = Σ_j v_ji(m) z_j^m for all i and m, then ∏ w_i(n_i) z_i^{n_i} is a stationary weight on any graph.',
  citation: [
    sources.spitzer1970,
    sources.evansMajumdarZia2004,
    sources.evansMajumdarZia2006,
    sources.greenblattLebowitz2006,
    sources.evansHanney2005,
  ],
  kinetics: 'general',
  judge(context): Judgement {
    const sites = sitesOnly(context);
    if (sites.holds !== true) return judged([sites], null, false);
    const rates = factorisedRates(context);
    return judged([sites, ...rates.hypotheses], rates.weight, rates.fromStart);
  },
};

function judged(hypotheses: readonly Hypothesis[], weight: string | null, fromStart: boolean): Judgement {
  const applies = appliesWhenAllHold(hypotheses);
  return {
    applies,
    scope: fromStart ? 'these constants and start' : 'these constants',
    hypotheses,
    conclusion: {
      yes: `${fromStart ? 'With as many units as the start has, the' : 'The'} weight ∏ w_i(n_i) z_i^{n_i} is stationary in continuous time${weight === null ? '' : `, with ${weight}`}. Where the sum of the weights over the counts that can be reached is finite, it gives the stationary law there.`,
      no: 'The theorem does not apply. It does not follow that no product is stationary: on a general graph the condition is sufficient, not necessary. For the homogeneous one-way ring Evans, Majumdar, Zia 2004 show that it is necessary as well.',
      undecided: 'Undecided; the hypotheses that are open are marked.',
    }[applies],
    silentOn:
      'Discrete time with all sites moving at once, where the single-site weight is the convolution of v and w instead.',
  };
}

/** Every reaction takes m units from one site to another: m X_i → m X_j. */
function sitesOnly(context: TheoremContext): Hypothesis {
  const claim = 'mass moves between sites';
  const text =
    'Every reaction moves a whole number of units from one site to one other, and nothing else changes a species.';
  const { interventions } = context.kinetics;
  if (interventions !== null) return { claim, text: `${text} Here ${interventions}.`, holds: false };
  if (context.huge) return { claim, text: `${text} The network is too large to look at each.`, holds: null };
  const other = context.arrows.findIndex(({ from, to }) => {
    const [source, ...more] = context.terms(from);
    const [target, ...others] = context.terms(to);
    return (
      source === undefined ||
      target === undefined ||
      more.length + others.length > 0 ||
      source.coefficient !== target.coefficient ||
      !Number.isInteger(source.coefficient)
    );
  });
  return other < 0
    ? { claim, text, holds: true }
    : { claim, text, holds: false, witness: { kind: 'arrow', reaction: context.reactionOf(other) } };
}
