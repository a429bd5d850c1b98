import type { Network } from '@stillroom/shared/network';
import {
  compartmentOfSpecies,
  crossesCompartments,
  type Member,
  members,
  netCoefficients,
} from '../rates/index.ts';
import { expressionTex, factorTex, nameTex, numberTex } from './tex.ts';

/** The rate equation of every species that moves: the right-hand side of d of/dt, terms in order of the reactions. */
export function rateEquationsTex(network: Network): { of: string; tex: string }[] {
  const { species, complexes, reactions } = network;
  const contents = Array.from({ length: complexes.count }, (_, index) => members(complexes, index));
  const compartmentOf = compartmentOfSpecies(network);
  const terms: string[][] = species.map(() => []);
  for (let reaction = 0; reaction < reactions.count; reaction++) {
    const from = contents[reactions.from[reaction]!]!;
    const to = contents[reactions.to[reaction]!]!;
    const rate = rateTex(network, reaction, from);
    if (rate === null) continue;
    const touched = [...from, ...to].map(({ species: index }) => index);
    const across = crossesCompartments(compartmentOf, touched);
    for (const { species: index, coefficient: change } of netCoefficients(from, to)) {
      if (change === 0) continue;
      const size = Math.abs(change);
      const factor = size === 1 ? '' : `${numberTex(size)} \\, `;
      const compartment = network.compartments[compartmentOf[index]!];
      const share = across && compartment ? `\\frac{1}{${nameTex(compartment.name)}} \\, ` : '';
      terms[index]!.push(`${change < 0 ? '-' : '+'} ${factor}${share}${rate}`);
    }
  }
  return species.flatMap((name, index) => {
    if (network.fixed.has(index)) return [];
    const rule = network.rateRules.get(index);
    if (rule !== undefined) return [{ of: name, tex: expressionTex(rule) }];
    const tex = terms[index]!.join(' ').replace(/^\+ /, '').replace(/^- /, '-');
    return [{ of: name, tex: tex === '' ? '0' : tex }];
  });
}

/** The rate of a reaction as a factor; null for the zero law of a backward arrow under a net law. */
function rateTex(network: Network, reaction: number, from: readonly Member[]): string | null {
  const { species, reactions, laws, constants } = network;
  const law = reactions.law[reaction]!;
  if (law >= 0) {
    const { expression } = laws[law]!;
    return expression.kind === 'number' && expression.value === 0 ? null : factorTex(expression);
  }
  const factors = from.map(({ species: index, coefficient }) => {
    const tex = nameTex(species[index]!);
    return coefficient === 1 ? tex : `{${tex}}^{${numberTex(coefficient)}}`;
  });
  return [nameTex(constants[reactions.constant[reaction]!]!.name), ...factors].join(' \\, ');
}
