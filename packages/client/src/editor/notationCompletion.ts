import type { CompletionContext, CompletionResult } from '@codemirror/autocomplete';
import { completionsAt } from '@stillroom/shared/notation';

/** A longer text is searched for its names only when one asks, with Ctrl Space. */
const longText = 200_000;

/** What may stand where one types in a network: statements, species, constants, units, functions. */
export function notationCompletion(context: CompletionContext): CompletionResult | null {
  const { state, pos, explicit } = context;
  if (!explicit && state.doc.length > longText) return null;
  const { from, options } = completionsAt(state.doc.toString(), pos);
  // Between words only units are offered unasked: after a number one is nearly always wanted.
  if (from === pos && !explicit && options[0]?.kind !== 'unit') return null;
  const word = state.sliceDoc(from, pos);
  const others = options.filter(({ label }) => label !== word);
  if (others.length === 0) return null;
  return {
    from,
    options: others.map(({ label, kind, detail }) => ({
      label,
      type: kind,
      ...(kind === 'unit' ? {} : { detail }),
    })),
    validFor: /^[\p{L}\p{N}_']*$/u,
  };
}
