const levels = ['error', 'warn', 'info', 'debug'] as const;
export type LogLevel = (typeof levels)[number];

/** One line per event on standard output: time, level, words, then fields as JSON. Never a secret, never a body. */
export interface Logger {
  error(words: string, fields?: Readonly<Record<string, unknown>>): void;
  warn(words: string, fields?: Readonly<Record<string, unknown>>): void;
  info(words: string, fields?: Readonly<Record<string, unknown>>): void;
  debug(words: string, fields?: Readonly<Record<string, unknown>>): void;
}

/** A logger that leaves out everything below `least`; `write` gets whole lines. */
export function createLogger(
  least: LogLevel,
  write: (line: string) => void = (line) => void process.stdout.write(line),
): Logger {
  const at = (level: LogLevel) => (words: string, fields?: Readonly<Record<string, unknown>>) => {
    if (levels.indexOf(level) > levels.indexOf(least)) return;
    const rest = fields === undefined ? '' : ` ${JSON.stringify(fields)}`;
    write(`${new Date().toISOString()} ${level} ${words}${rest}\n`);
  };
  return { error: at('error'), warn: at('warn'), info: at('info'), debug: at('debug') };
}

/** An unknown error as fields of a log line. */
export function describeError(error: unknown): Readonly<Record<string, unknown>> {
  return error instanceof Error ? { error: error.message, stack: error.stack } : { error: String(error) };
}
