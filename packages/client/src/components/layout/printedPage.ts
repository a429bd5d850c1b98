import { onBeforeUnmount, onMounted, watchEffect } from 'vue';

/** What stands in the margins of a printed page. */
export interface PrintedMargins {
  readonly group: string;
  readonly title: string;
  /** At the foot: of a record its number and the first and last groups of its digest. */
  readonly foot?: string;
}

/** A string of CSS: what would end it early is escaped. */
const quoted = (words: string) => `"${words.replaceAll(/["\\]/gu, '\\$&').replaceAll(/[\n\r\f]+/gu, ' ')}"`;

const box = (place: string, content: string, font: string) =>
  `@${place} { content: ${content}; font: ${font}; color: #3e4755; }`;

const serif = "italic 9.5pt 'Gentium Book Plus', Georgia, serif";
const figures = "8.5pt 'Fira Mono', monospace";

/**
 * Running head and foot on paper, from the second page on; page numbers on all. A constructed sheet, since the content
 * policy refuses styles in text.
 */
export function usePrintedPage(margins: () => PrintedMargins): void {
  const sheet = new CSSStyleSheet();
  watchEffect(() => {
    const { group, title, foot = '' } = margins();
    sheet.replaceSync(
      `@page { ${box('top-left', quoted(group), serif)} ${box('top-right', quoted(title), serif)} ` +
        `${box('bottom-left', quoted(foot), figures)} ` +
        `${box('bottom-right', 'counter(page) " of " counter(pages)', serif)} } ` +
        '@page :first { @top-left { content: none; } @top-right { content: none; } }',
    );
  });
  onMounted(() => document.adoptedStyleSheets.push(sheet));
  onBeforeUnmount(() => {
    document.adoptedStyleSheets = document.adoptedStyleSheets.filter((one) => one !== sheet);
  });
}
