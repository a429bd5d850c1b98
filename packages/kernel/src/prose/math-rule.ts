import { mathAt } from '@stillroom/shared/paths';
import type { MarkdownIt } from 'markdown-it';

/**
 * Teaches the Markdown reader `$…$` and `$$…$$`. A displayed formula that fills its lines is a block of its own, so that a
 * line of it that begins with = or - is not taken for a heading or a list. The page sets the formulas.
 */
export function mathRule(markdown: MarkdownIt): void {
  markdown.inline.ruler.before('escape', 'math', (state, silent) => {
    const math = mathAt(state.src, state.pos);
    if (math === null) return false;
    if (!silent) {
      const token = state.push('math', '', 0);
      token.content = math.tex;
      token.meta = { display: math.display };
    }
    state.pos = math.to;
    return true;
  });

  markdown.block.ruler.before(
    'fence',
    'math_block',
    (state, startLine, endLine, silent) => {
      const begin = (state.bMarks[startLine] ?? 0) + (state.tShift[startLine] ?? 0);
      if (!state.src.startsWith('$$', begin)) return false;
      const math = mathAt(state.src, begin);
      if (math === null) return false;
      let line = startLine;
      while (line < endLine && (state.eMarks[line] ?? 0) < math.to) line++;
      if (line >= endLine || state.src.slice(math.to, state.eMarks[line]).trim() !== '') return false;
      if (silent) return true;
      state.push('paragraph_open', 'p', 1);
      const token = state.push('inline', '', 0);
      token.content = state.src.slice(begin, math.to);
      token.map = [startLine, line + 1];
      token.children = [];
      state.push('paragraph_close', 'p', -1);
      state.line = line + 1;
      return true;
    },
    { alt: ['paragraph', 'reference', 'blockquote', 'list'] },
  );

  markdown.renderer.rules['math'] = (tokens, index) => {
    const token = tokens[index];
    const tex = markdown.utils.escapeHtml(token?.content ?? '');
    const display = (token?.meta as { display: boolean } | null)?.display === true ? ' data-display=""' : '';
    return `<span data-tex="${tex}"${display}>${tex}</span>`;
  };
}
