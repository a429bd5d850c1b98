import type { Applies, Hypothesis } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { countRates, weightsSummable } from './counts/weight-hypotheses.ts';
import { wholeLattice } from './counts/reachability.ts';
import { sources } from './sources.ts';
import type { Judgement, Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Anderson, Craciun, Kurtz 2010; Cappelletti, Wiuf 2016; Anderson, Cappelletti, Koyama, Kurtz 2018. */
export const productForm: Theorem = {
  id: 'product-form',
  title: 'Stationary law of product form',
  statement:
    'In counts, a mass-action network that is complex balanced at c has on every closed irreducible set the stationary law proportional to ∏ C_i^{x_i}/x_i!, C = V c molecules; with weights θ_i in place of counts, x_i! becomes ∏ θ_i(j), provided the law can be normalised.',
  citation: [
    sources.andersonCraciunKurtz2010,
    sources.cappellettiWiuf2016,
    sources.andersonCappellettiKoyamaKurtz2018,
  ],
  kinetics: 'mass action',
  judge(context): Judgement {
    const rates = countRates(context);
    if (context.deficiency === 0 && !context.weaklyReversible && context.network.weights.size === 0) {
      return deficiencyZeroCase(rates);
    }
    const balanced = context.verdict('complex-balance');
    const isBalanced: Hypothesis = {
      claim: 'complex balanced',
      text: `The rate equations are complex balanced${balanced.scope === 'all constants' ? ' for all constants' : ' for these constants'}.`,
      holds: { yes: true, no: false, undecided: null }[balanced.applies],
    };
    const hypotheses = [rates, isBalanced, ...(balanced.applies === 'yes' ? weightsSummable(context) : [])];
    const applies = appliesWhenAllHold(hypotheses);
    const weighted = context.network.weights.size > 0;
    const finite = context.conservation?.holds === true;
    return {
      applies,
      ...(applies === 'yes' ? { case: weighted ? 'weights' : 'mass action' } : {}),
      scope:
        balanced.scope === 'all constants' && (!weighted || finite) ? 'all constants' : 'these constants',
      hypotheses,
      conclusion: conclusion(context, applies, weighted, finite, balanced.conclusion),
      silentOn: SILENT,
    };
  },
};

const SILENT =
  'How fast the law is approached. The long-time behaviour of counts and that of rate equations do not imply each other.';

function deficiencyZeroCase(rates: Hypothesis): Judgement {
  const hypotheses: Hypothesis[] = [
    rates,
    {
      claim: 'deficiency',
      text: 'The deficiency is 0.',
      holds: true,
      witness: { kind: 'number', left: 0, right: 0 },
    },
  ];
  const applies = appliesWhenAllHold(hypotheses);
  return {
    applies,
    ...(applies === 'yes' ? { case: 'deficiency zero' } : {}),
    scope: 'all constants',
    hypotheses,
    conclusion:
      applies === 'yes'
        ? 'For all constants, on every closed irreducible set of counts the stationary law is proportional to ∏ C_i^{x_i}/x_i!, where C comes from the reactions that are active there; reactions that are not can never occur again.'
        : NOTHING,
    silentOn: SILENT,
  };
}

const NOTHING =
  'The theorem does not apply: nothing follows from it about the stationary law, which may have another form.';

function conclusion(
  context: TheoremContext,
  applies: Applies,
  weighted: boolean,
  finite: boolean,
  missing: string,
): string {
  if (applies === 'no') return NOTHING;
  if (applies === 'undecided')
    return missing.startsWith('Needs values')
      ? missing
      : 'Undecided; the hypotheses that are open are marked.';
  const factor = weighted
    ? '∏ C_i^{x_i}/∏_{j≤x_i} θ_i(j), θ_i(j) = j for species without a weight'
    : '∏ C_i^{x_i}/x_i!';
  const law = `On every closed irreducible set Γ of counts the law proportional to ${factor}, C = V c molecules at a complex-balanced state c, is the unique stationary one, and the process does not explode.`;
  if (finite) {
    return `${law} Γ is finite here, because the network is conservative: the law is that product conditioned on Γ, so counts are in general neither independent nor of mean C.`;
  }
  return wholeLattice(context)
    ? `${law} Γ is the whole lattice, because every state can be reached from every other: the counts are independent${weighted ? '' : ' Poisson with means C'}.`
    : `${law} The counts are independent only where Γ is the whole lattice; otherwise the law is that product conditioned on Γ, in general neither independent nor of mean C.`;
}
