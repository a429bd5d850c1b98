import DOMPurify from 'dompurify';

/**
 * Prose as it may stand on a page: the engine writes no raw HTML, scripts or styles, and what else a record or a
 * stranger's server might hold is taken out here.
 */
export const safeHtml = (html: string): DocumentFragment =>
  DOMPurify.sanitize(html, {
    RETURN_DOM_FRAGMENT: true,
    FORBID_TAGS: ['style', 'form', 'input', 'button', 'iframe', 'svg', 'math'],
    FORBID_ATTR: ['style'],
    ADD_ATTR: [
      'data-tex',
      'data-display',
      'data-path',
      'data-cell',
      'data-reference',
      'data-cite',
      'data-entry',
      'target',
    ],
  });

/** Typesets every `[data-tex]` below an element. KaTeX sets its styles through the object model. */
export async function setMathematics(root: ParentNode): Promise<void> {
  const places = [...root.querySelectorAll<HTMLElement>('[data-tex]')];
  if (places.length === 0) return;
  const { default: katex } = await import('./katex.ts');
  for (const place of places)
    katex.render(place.dataset['tex'] ?? '', place, {
      displayMode: place.dataset['display'] !== undefined,
      throwOnError: false,
      errorColor: 'var(--brick)',
      trust: false,
      maxExpand: 500,
    });
}
