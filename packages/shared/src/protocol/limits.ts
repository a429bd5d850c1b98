/** Bounds that both ends keep, in one place. Sizes in bytes unless said otherwise. */
export const limits = {
  /** One live frame. */
  frame: 4 * 1024 * 1024,
  /** Live lines that one person may have open to one server process. */
  linesOfOne: 60,
  /** Lines that wait to be let in by one server process: of those nobody knows yet who is there. */
  linesBefore: 400,
  /** A JSON body of somebody who is not signed in. */
  strangersBody: 64 * 1024,
  /** One cell's text, in UTF-16 units. */
  cellText: 2_000_000,
  /** Cells in a notebook. */
  cells: 1000,
  /** An imported notebook file. */
  notebookFile: 16 * 1024 * 1024,
  /** An uploaded picture. */
  picture: 5 * 1024 * 1024,
  /** A result that rides along in a plan notice instead of being fetched. */
  inlineResult: 64 * 1024,
  /** Longest deadline a cell may ask for, in seconds, and the usual one. */
  deadlineMost: 600,
  deadlineUsual: 60,
} as const;
