/** Names of cells: a letter, then letters, digits or `_`. */
export const cellNamePattern = /^\p{L}[\p{L}\p{N}_]*$/u;

/** Whether a text can name a cell. */
export const isCellName = (name: string): boolean => cellNamePattern.test(name.normalize('NFC'));
