import { walkSyntax } from '../../expression/names.ts';
import type { ExpressionSyntax } from '../../expression/syntax.ts';
import type { ItemSyntax, RowSyntax } from '../ast.ts';

/** A named item of a row with a law: a constant that the law uses, with or without its value. */
export type LawConstant = ItemSyntax & { readonly kind: 'constant' };

/** How many directed arrows an item gives the rate of. */
export const arrowsOfItem = (item: ItemSyntax): number => (item.kind === 'net' ? 2 : 1);

const isLaw = ({ kind }: ItemSyntax): boolean => kind === 'law' || kind === 'net';

/**
 * Parts the items of a row into those that give rates and those that tell the constants of its laws:
 * `law = Vmax*S/(Km + S), Vmax = 3 uM/s, Km`. Laws and values without name always give rates; of the named items the
 * first, as many as arrows are left over, do too. What is beyond them and in no law of the row is one constant too many.
 */
export function partItems(
  row: RowSyntax,
  arrows: number,
): { readonly ofRates: readonly ItemSyntax[]; readonly ofLaws: readonly LawConstant[] } {
  if (!row.items.some(isLaw)) return { ofRates: row.items, ofLaws: [] };
  const laws = row.items.flatMap((item) => (item.kind === 'law' || item.kind === 'net' ? [item.value] : []));
  const used = namesIn(laws);
  const certain = row.items.filter((item) => item.kind !== 'constant');
  let left = arrows - certain.reduce((count, item) => count + arrowsOfItem(item), 0);
  const ofRates: ItemSyntax[] = [];
  const ofLaws: LawConstant[] = [];
  for (const item of row.items) {
    if (item.kind !== 'constant') ofRates.push(item);
    else if (left <= 0 && used.has(item.name.name)) ofLaws.push(item);
    else {
      left -= 1;
      ofRates.push(item);
    }
  }
  return { ofRates, ofLaws };
}

/** The names in laws, and the words after `/` that may turn out to be names: `3/Km`. */
function namesIn(laws: readonly ExpressionSyntax[]): ReadonlySet<string> {
  const names = new Set<string>();
  for (const law of laws) {
    walkSyntax(law, (part) => {
      if (part.kind === 'name') names.add(part.name);
      if (part.kind === 'measured') for (const { symbol } of part.unit) names.add(symbol);
    });
  }
  return names;
}
