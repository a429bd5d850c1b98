import { type WovenSpan, wovenAt } from '@stillroom/shared/paths';
import type { MarkdownIt, Token } from 'markdown-it';

/** What stands in the text for a woven value. */
export type Weave = {
  readonly path: string;
  readonly cell: string;
  readonly text: string;
};

/** The weave that a token of the type "woven" carries. */
export const weaveOf = (token: Token | undefined): Weave => token?.meta as unknown as Weave;

/** Teaches the Markdown reader `=[path, filters…]`; `weave` finds the words, null where the span is none of ours. */
export function wovenRule(markdown: MarkdownIt, weave: (span: WovenSpan) => Weave | null): void {
  markdown.inline.ruler.before('escape', 'woven', (state, silent) => {
    const span = wovenAt(state.src, state.pos);
    const woven = span === null ? null : weave(span);
    if (span === null || woven === null) return false;
    if (!silent) {
      const token = state.push('woven', '', 0);
      token.meta = woven;
    }
    state.pos = span.to;
    return true;
  });

  markdown.renderer.rules['woven'] = (tokens, index) => {
    const { path, cell, text } = weaveOf(tokens[index]);
    const escape = markdown.utils.escapeHtml;
    return `<span data-path="${escape(path)}" data-cell="${escape(cell)}">${escape(text)}</span>`;
  };
}
