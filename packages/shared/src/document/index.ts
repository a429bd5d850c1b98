export {
  addCell,
  cellOrder,
  cellsMap,
  cellText,
  deleteCell,
  fillNotebook,
  holdCell,
  moveCell,
  nameCell,
  notebookMap,
  origins,
  readCell,
  readNotebook,
  subjects,
  writeAbout,
  writeSettings,
} from './layout.ts';
export type { CellContent, NotebookContent, Subject } from './layout.ts';
