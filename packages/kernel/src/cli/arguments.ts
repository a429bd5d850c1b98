/** What the command line asks for. */
export interface Arguments {
  readonly file: string;
  /** Only this cell (and what it draws on) is computed and printed. */
  readonly cell: string | null;
  /** Where results go instead of standard output. */
  readonly out: string | null;
}

export const usage = 'Usage: npm run -s evaluate -- FILE [--cell NAME] [--out FILE]';

/** Reads the words after the command; a text is a complaint about them. */
export function readArguments(words: readonly string[]): Arguments | string {
  let file: string | null = null;
  const options: { cell: string | null; out: string | null } = { cell: null, out: null };
  for (let at = 0; at < words.length; at++) {
    const word = words[at] ?? '';
    const [, name, attached] = /^--(cell|out)(?:=(.*))?$/su.exec(word) ?? [];
    if (name === 'cell' || name === 'out') {
      const value = attached ?? words[++at];
      if (value === undefined || value === '')
        return `--${name} needs ${name === 'cell' ? 'a name' : 'a file'} after it. ${usage}`;
      options[name] = value;
    } else if (word.startsWith('--') && word !== '--') {
      return `There is no option ${word}. ${usage}`;
    } else if (file === null) {
      file = word;
    } else {
      return `One file at a time: "${word}" is one too many. ${usage}`;
    }
  }
  return file === null || file === '' ? `A file is needed. ${usage}` : { file, ...options };
}
