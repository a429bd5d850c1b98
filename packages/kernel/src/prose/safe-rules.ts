import { isCellName } from '@stillroom/shared/cells';
import type { MarkdownIt, Token } from 'markdown-it';

const alignments = /^text-align:(left|center|right)$/u;

const attribute = (token: Token | undefined, name: string): string => String(token?.attrGet(name) ?? '');

/** The content policy allows no style attributes: the alignment of a table's column becomes a class. */
function styleless(token: Token): void {
  const aligned = alignments.exec(attribute(token, 'style'))?.[1];
  token.attrs = token.attrs?.filter(([name]) => name !== 'style') ?? null;
  if (aligned !== undefined) token.attrJoin('class', `align-${aligned}`);
}

function decoded(text: string): string {
  try {
    return decodeURIComponent(text);
  } catch {
    return text;
  }
}

/** `[](#run1)` refers to a cell: the page puts in the figure's, scheme's or claim's number. */
function reference(token: Token): void {
  const href = attribute(token, 'href');
  if (!href.startsWith('#')) return;
  const name = decoded(href.slice(1));
  if (isCellName(name)) token.attrSet('data-reference', name);
}

const ownPicture = /^(?:\/(?!\/)|data:image\/(?:png|jpeg|gif|webp);)/u;

function walk(tokens: readonly Token[], visit: (token: Token) => void): void {
  for (const token of tokens) {
    visit(token);
    if (token.children !== null) walk(token.children, visit);
  }
}

/**
 * Keeps the HTML within the content policy: no style attributes, pictures from here only (others become links), links
 * out of the page without a trace of where they came from.
 */
export function safeRules(markdown: MarkdownIt): void {
  markdown.core.ruler.push('safe', (state) => {
    walk(state.tokens, (token) => {
      if (token.attrGet('style') !== null) styleless(token);
      if (token.type === 'link_open') {
        reference(token);
        if (/^https?:/iu.test(attribute(token, 'href'))) token.attrSet('rel', 'noopener noreferrer');
      }
    });
  });

  const picture = markdown.renderer.rules.image;
  markdown.renderer.rules.image = (tokens, index, options, environment, renderer) => {
    const token = tokens[index];
    const source = attribute(token, 'src');
    if (picture !== undefined && ownPicture.test(source)) {
      return picture(tokens, index, options, environment, renderer);
    }
    const escape = markdown.utils.escapeHtml;
    const words = token?.content === undefined || token.content === '' ? source : token.content;
    return `<a href="${escape(source)}" rel="noopener noreferrer">${escape(words)}</a>`;
  };
}
