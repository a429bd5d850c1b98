import { counted } from '../../composables/dates.ts';
import type { Hypothesis, Verdict } from '@stillroom/shared/cells';
import { numberText } from './numbers.ts';
import type { StructureResult } from './shapes.ts';
import { complexLabel } from './terms.ts';

const number = (value: number | string) => (typeof value === 'number' ? numberText(value, 6) : value);

/** How two numbers stand to each other where a hypothesis compares them. */
function comparison({ claim, holds }: Hypothesis, left: string, right: string): string {
  if (claim === 'class deficiency at most one') return `${left} ${holds === false ? '>' : '≤'} ${right}`;
  if (claim === 'deficiency') return `δ = ${left}`;
  if (claim === 'attraction is proven' && left !== right) return `${left} ≤ ${right}`;
  if (claim === 'weight summable' && left !== right)
    return `C = ${left} ${holds === false ? '>' : '<'} ${right}`;
  // The sentence says the number, and what it means.
  if (claim === 'leading terms recur' || claim === 'leading terms do not explode') return '';
  return `${left} ${left === right ? '=' : '≠'} ${right}`;
}

/** The evidence of a hypothesis in a few words; empty where the hypothesis speaks for itself. */
export function witnessText(hypothesis: Hypothesis, structure: StructureResult | null): string {
  const { witness } = hypothesis;
  if (witness === undefined) return '';
  const speaksOfStructure = witness.kind === 'arrow' || (witness.kind === 'vector' && witness.of !== 'laws');
  if (structure === null && speaksOfStructure) return '';
  const label = (index: number) => complexLabel(structure?.complexes?.[index]?.of ?? {});
  switch (witness.kind) {
    case 'arrow': {
      const reaction = structure?.reactions?.[witness.reaction];
      return reaction === undefined ? '' : `${label(reaction.from)} → ${label(reaction.to)}`;
    }
    case 'set':
      return 'species' in witness
        ? `{${witness.species.join(', ')}}`
        : `{${witness.complexes.map(label).join(', ')}}`;
    case 'number':
      return comparison(hypothesis, number(witness.left), number(witness.right));
    case 'vector': {
      const named = (key: string) => {
        if (witness.of === 'complexes') return label(Number(key));
        if (witness.of === 'fluxes') {
          const reaction = structure?.reactions?.[Number(key)];
          if (reaction === undefined) return `reaction ${key}`;
          const back = reaction.reverse !== null && reaction.reverse < Number(key);
          return `R${reaction.row + 1}${reaction.reverse === null ? '' : back ? '←' : '→'}`;
        }
        return key;
      };
      const count = Object.keys(witness.entries).length;
      if (witness.of === 'fluxes' && count > 4) return `a flux on ${count} arrows`;
      const terms = Object.entries(witness.entries).map(([key, value]) =>
        String(value) === '1'
          ? named(key)
          : String(value) === '-1'
            ? `−${named(key)}`
            : `${String(value).replace('-', '−')} ${named(key)}`,
      );
      return terms.length > 8
        ? `${terms.slice(0, 8).join(', ')} and ${terms.length - 8} more`
        : terms.join(', ');
    }
    case 'minors':
      return counted(witness.pairs.length, 'product of minors', 'products of minors');
    case 'states':
      return `${witness.boxes.length} steady states in proven boxes`;
  }
}

/** "D. F. Anderson, T. G. Kurtz" as "Anderson, Kurtz"; of more than four, the first three "and others". */
function familyNames(authors: string): string {
  const names = authors.split(', ').map((name) => name.replace(/^(?:\p{Lu}\.[\s-]*)+/u, ''));
  return names.length > 4 ? `${names.slice(0, 3).join(', ')} and others` : names.join(', ');
}

/** "Feinberg 1987, 1995; Horn, Jackson 1972": who proved it, works of the same authors together. */
export function citationText(citation: Verdict['citation']): string {
  const years = new Map<string, number[]>();
  for (const { authors, year } of citation) {
    const names = familyNames(authors);
    const known = years.get(names) ?? [];
    if (!known.includes(year)) years.set(names, [...known, year]);
  }
  return [...years].map(([names, of]) => `${names} ${of.join(', ')}`).join('; ');
}
