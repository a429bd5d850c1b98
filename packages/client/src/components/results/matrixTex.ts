import type { NetworkResult, Sides } from './shapes.ts';

const name = (text: string) =>
  `\\mathrm{${text.replace(/^(.+?)\[(.+)\]$/u, '$1_{$2}').replace(/_(?!\{)/gu, '\\_')}}`;

/** Exact difference of two coefficients where both are whole; fractions stay as written. */
function difference(to: number | string | undefined, from: number | string | undefined): string {
  const [a, b] = [Number(to ?? 0), Number(from ?? 0)];
  if (Number.isFinite(a) && Number.isFinite(b)) return String(Number((a - b).toPrecision(12)));
  return `${to ?? 0} - ${from ?? 0}`;
}

/** Larger matrices are cut, and say so. */
const most = 24;

/** The stoichiometric matrix N as LaTeX, species down, reactions along, in the order of the results. */
export function stoichiometricTex(result: NetworkResult): string {
  const species = result.species.slice(0, most);
  const reactions = result.reactions.slice(0, most);
  const cut = result.species.length > most || result.reactions.length > most;
  const entry = (of: string, { from, to }: { from: Sides; to: Sides }) => difference(to[of], from[of]);
  const rows = species.map((of) =>
    [name(of), ...reactions.map((reaction) => entry(of, reaction))].join(' & '),
  );
  const head = ['', ...reactions.map(({ row }) => `R_{${row + 1}}`)].join(' & ');
  return `N = \\begin{array}{r|${'r'.repeat(reactions.length)}} ${head} \\\\ \\hline ${rows.join(' \\\\ ')} \\end{array}${cut ? '\\;\\cdots' : ''}`;
}
