export type {
  ArrowSyntax,
  AssignmentSyntax,
  FamilySyntax,
  ItemSyntax,
  LineSyntax,
  NetworkTree,
  RowSyntax,
  SideSyntax,
  TargetSyntax,
  TermSyntax,
} from './ast.ts';
export { CanonicalLines, canonicalText } from './canonical.ts';
export type { Complaint, NotationReading, Repair } from './complaint.ts';
export { alignColumns } from './editing/align.ts';
export { applyChanges } from './editing/change.ts';
export type { TextChange } from './editing/change.ts';
export { completionsAt } from './editing/complete.ts';
export type { CompletionOption, Completions } from './editing/complete.ts';
export { highlightLine } from './editing/highlight.ts';
export type { Highlight, HighlightStyle } from './editing/highlight.ts';
export { textOfReactionList } from './editing/paste.ts';
export { addRow, removeRow, setRowField, tableFields, tableOf, withRowField } from './editing/table.ts';
export type { TableField, TableRow } from './editing/table.ts';
export { parseNetwork } from './parse.ts';
export { printNetwork } from './print.ts';
export { readNetwork } from './read.ts';
