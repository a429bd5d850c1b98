import type { CellContent } from '@stillroom/shared/document';

/** A cell whose name is its id (prose has none); what is not said is empty. */
export const cell = (
  id: string,
  kind: CellContent['kind'],
  text: string,
  rest: Partial<CellContent> = {},
): CellContent => ({ id, kind, name: kind === 'prose' ? '' : id, text, settings: {}, held: null, ...rest });
