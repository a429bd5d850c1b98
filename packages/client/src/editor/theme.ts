import { HighlightStyle, syntaxHighlighting } from '@codemirror/language';
import { EditorView } from '@codemirror/view';
import { tags } from '@lezer/highlight';

/** What all editors share: the page's own type, no frame, the rhythm of the ruled lines. */
export const editorTheme = EditorView.theme({
  '&': { color: 'var(--ink)', backgroundColor: 'transparent' },
  '&.cm-focused': { outline: 'none' },
  '.cm-content': { padding: '0', caretColor: 'var(--blue-line)' },
  '.cm-line': { padding: '0' },
  '.cm-cursor': { borderLeft: '2px solid var(--blue-line)', marginLeft: '-1px' },
  '.cm-selectionBackground, &.cm-focused > .cm-scroller > .cm-selectionLayer .cm-selectionBackground': {
    background: 'var(--blue-wash)',
  },
  '.cm-content ::selection': { backgroundColor: 'var(--blue-wash)' },
  '.cm-gutters': { backgroundColor: 'transparent', border: '0', color: 'var(--ink3)' },
  '.cm-tooltip': {
    background: 'var(--raised)',
    border: '1px solid var(--rule-strong)',
    borderRadius: '3px',
    color: 'var(--ink)',
  },
  '.cm-tooltip.cm-tooltip-autocomplete > ul': {
    fontFamily: 'var(--mono)',
    fontSize: '12.5px',
    maxHeight: '14em',
  },
  '.cm-tooltip.cm-tooltip-autocomplete > ul > li': { padding: '3px 8px', lineHeight: '19px' },
  '.cm-tooltip-autocomplete ul li[aria-selected]': { background: 'var(--ink)', color: 'var(--on-ink)' },
  '.cm-completionDetail': {
    fontFamily: 'var(--sans)',
    fontStyle: 'normal',
    marginLeft: '1.2em',
    opacity: '.8',
  },
});

/** Sizes of the ledger: Fira Mono 12 on 24, so that the notation sits on the ruled lines. */
export const ledgerTheme = EditorView.theme({
  '.cm-scroller': {
    fontFamily: 'var(--mono)',
    fontSize: '12px',
    lineHeight: '24px',
    fontVariantLigatures: 'none',
  },
  // What is too long for the page goes on further in, so that it does not read as the next line.
  '.cm-line': { paddingLeft: '4ch', textIndent: '-4ch' },
  '.cm-line .caret, .cm-line .room': { textIndent: '0' },
});

/** Sizes of prose being written: as it will be set. */
export const proseTheme = EditorView.theme({
  '.cm-scroller': { fontFamily: 'var(--serif)', fontSize: '18px', lineHeight: '27px' },
  '.cm-content': { fontFeatureSettings: '"kern", "lnum"' },
});

/** Colours of what is typed: numbers blue, notes green, comments and bars grey, the rest in ink. */
export const inkHighlighting = syntaxHighlighting(
  HighlightStyle.define([
    { tag: tags.comment, color: 'var(--ink3)' },
    { tag: tags.separator, color: 'var(--rule-strong)' },
    { tag: tags.operatorKeyword, fontWeight: '500' },
    { tag: [tags.number, tags.unit], color: 'var(--blue)' },
    { tag: tags.annotation, color: 'var(--green)' },
    { tag: [tags.keyword, tags.definitionKeyword, tags.controlKeyword], fontWeight: '500' },
    { tag: [tags.string, tags.special(tags.string)], color: 'var(--green)' },
    { tag: [tags.bool, tags.null], color: 'var(--blue)' },
    { tag: tags.function(tags.variableName), color: 'var(--ink)' },
    { tag: tags.propertyName, color: 'var(--ink)' },
    { tag: tags.invalid, color: 'var(--brick)' },
  ]),
);

/** Markdown as it is written in prose: headings and emphasis look as they will, signs are grey. */
export const markdownHighlighting = syntaxHighlighting(
  HighlightStyle.define([
    { tag: tags.heading1, fontSize: '25px', lineHeight: '32px' },
    { tag: tags.heading2, fontSize: '25px', lineHeight: '32px' },
    { tag: tags.heading3, fontSize: '20px', lineHeight: '27px' },
    { tag: tags.strong, fontWeight: '700' },
    { tag: tags.emphasis, fontStyle: 'italic' },
    { tag: [tags.link, tags.url], color: 'var(--blue)' },
    { tag: tags.monospace, fontFamily: 'var(--mono)', fontSize: '.78em' },
    { tag: [tags.processingInstruction, tags.contentSeparator], color: 'var(--ink3)' },
    { tag: tags.quote, fontStyle: 'italic' },
  ]),
);
