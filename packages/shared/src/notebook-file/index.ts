export { notebookFile, notebookFormat } from './notebook-file.ts';
export type { FileCell, NotebookFile } from './notebook-file.ts';
export { checkNotebookFile, readNotebookFile } from './read.ts';
export type { FileReading } from './read.ts';
export { cellResult, failureOf, resultOf, resultsFile, resultsFormat } from './results.ts';
export type { CellResult, ResultsFile } from './results.ts';
export { contentOfFile, notebookFileOf, writeNotebookFile } from './write.ts';
