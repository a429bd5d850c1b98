import { bibliographyOf, citationLabel } from '@stillroom/shared/bibliography';

/** Under which name the words of a citation stand among those of numbered cells: no cell is called so. */
export const citedName = (key: string): string => `@${key}`;

/** How the works that any prose of a notebook lists are cited, by `citedName`. */
export const citedWorks = (
  cells: readonly { readonly kind: string; readonly text: string }[],
): (readonly [string, string])[] =>
  cells.flatMap(({ kind, text }) =>
    kind === 'prose'
      ? bibliographyOf(text).map((entry) => [citedName(entry.key), citationLabel(entry)] as const)
      : [],
  );
