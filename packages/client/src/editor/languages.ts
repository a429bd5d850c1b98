import { autocompletion, closeBrackets, closeBracketsKeymap } from '@codemirror/autocomplete';
import type { Extension } from '@codemirror/state';
import { EditorView, keymap } from '@codemirror/view';
import type { Complaint } from '@stillroom/shared/notation';
import { alignedColumns } from './alignedColumns.ts';
import { complaints } from './complaints.ts';
import { litLines } from './litLines.ts';
import { notationCompletion } from './notationCompletion.ts';
import { notationHighlighting } from './notationHighlighting.ts';
import { checkNotation } from './notationReading.ts';
import { pastedReactions } from './pastedReactions.ts';
import { rowGutter } from './rowGutter.ts';
import { inkHighlighting, ledgerTheme, markdownHighlighting, proseTheme } from './theme.ts';

/** What a text is written in. */
export type TextLanguage = 'notation' | 'claim' | 'prose' | 'script' | 'json';

const plain: Extension = [ledgerTheme, inkHighlighting];

/** The ledger: colours, row numbers, aligned bars, complaints in place, completion. */
function notation(told: (found: readonly Complaint[]) => void): Extension {
  return [
    ledgerTheme,
    EditorView.lineWrapping,
    notationHighlighting,
    rowGutter,
    litLines,
    alignedColumns,
    pastedReactions,
    complaints(checkNotation, told),
    // Nothing is chosen until an arrow chooses it: Enter after "10 uM" begins a line, whatever is on offer.
    autocompletion({ override: [notationCompletion], icons: false, selectOnOpen: false }),
  ];
}

async function prose(): Promise<Extension> {
  const { markdown, markdownLanguage } = await import('@codemirror/lang-markdown');
  return [
    markdown({ base: markdownLanguage, addKeymap: false }),
    markdownHighlighting,
    proseTheme,
    EditorView.lineWrapping,
  ];
}

async function script(): Promise<Extension> {
  const { javascript } = await import('@codemirror/lang-javascript');
  return [javascript(), plain, closeBrackets(), keymap.of(closeBracketsKeymap), EditorView.lineWrapping];
}

async function json(): Promise<Extension> {
  // Vega-Lite is JSON, and every JSON value reads as a script's expression.
  const { javascript } = await import('@codemirror/lang-javascript');
  return [javascript(), plain, EditorView.lineWrapping];
}

/** The extensions of a language; the larger grammars come when they are first asked for. */
export async function languageOf(
  language: TextLanguage,
  told: (found: readonly Complaint[]) => void,
): Promise<Extension> {
  switch (language) {
    case 'notation':
      return notation(told);
    case 'claim':
      return [plain, EditorView.lineWrapping];
    case 'prose':
      return prose();
    case 'script':
      return script();
    case 'json':
      return json();
  }
}
