/** What the link in a letter opens to whoever has it. */
export type LetterKey = 'nothing' | 'account' | 'group' | 'record';

/** A letter ready to go: the same words as plain text and as HTML. */
export interface Letter {
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  readonly opens: LetterKey;
}

/** What a template says; the dress is the same for all. */
export interface LetterContent {
  readonly to: string;
  readonly subject: string;
  readonly opens: LetterKey;
  /** Name of the person written to, where it is known. */
  readonly name?: string;
  readonly paragraphs: readonly string[];
  /** Words someone else wrote, set apart as theirs. */
  readonly quote?: { readonly by: string; readonly words: string };
  readonly action?: { readonly words: string; readonly link: string };
  /** Small print: how long the link works, what to do when this was not asked for. */
  readonly closing: string;
}

/** Sets a letter in both forms. */
export function setLetter(content: LetterContent): Letter {
  const { to, subject, opens } = content;
  return { to, subject, opens, text: asText(content), html: asHtml(content) };
}

function asText({ name, paragraphs, quote, action, closing }: LetterContent): string {
  const parts = [name === undefined ? 'Hello,' : `Hello ${name},`, ...paragraphs];
  if (quote !== undefined && quote.words !== '') {
    parts.push(`${quote.by} writes:\n${quote.words.replace(/^/gmu, '> ')}`);
  }
  if (action !== undefined) parts.push(`${action.words}:\n${action.link}`);
  return [...parts, closing, 'Stillroom'].join('\n\n') + '\n';
}

function asHtml({ name, paragraphs, quote, action, closing }: LetterContent): string {
  const lines = [name === undefined ? 'Hello,' : `Hello ${name},`, ...paragraphs].map(
    (words) => `<p style="margin:0 0 16px">${escape(words)}</p>`,
  );
  if (quote !== undefined && quote.words !== '') {
    const words = escape(quote.words).replaceAll('\n', '<br>');
    lines.push(
      `<p style="margin:0 0 4px">${escape(quote.by)} writes:</p>`,
      `<blockquote style="margin:0 0 16px;padding-left:12px;border-left:2px solid #b0561d">${words}</blockquote>`,
    );
  }
  if (action !== undefined) {
    const link = escape(action.link);
    lines.push(
      `<p style="margin:0 0 16px"><a href="${link}" style="display:inline-block;padding:10px 16px;` +
        `background:#151e2b;color:#fdfcf7;text-decoration:none;border-radius:3px">${escape(action.words)}</a></p>`,
      `<p style="margin:0 0 16px;font-size:14px">Or copy this address: ${link}</p>`,
    );
  }
  lines.push(`<p style="margin:0;font-size:14px;color:#4c5361">${escape(closing)}</p>`);
  return (
    '<!doctype html><html lang="en"><body style="margin:0;padding:24px;background:#d9d9cf">' +
    '<div style="max-width:560px;margin:0 auto;padding:24px;background:#fdfcf7;color:#151e2b;' +
    'font:16px/1.5 Georgia,serif">' +
    '<p style="margin:0 0 16px;font-size:20px">Stillroom</p>' +
    `${lines.join('')}</div></body></html>`
  );
}

const entities: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};
const escape = (words: string): string => words.replace(/[&<>"']/gu, (sign) => entities[sign] ?? sign);
