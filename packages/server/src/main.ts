import { ConfigError, readConfig } from './config/index.ts';
import { createLogger, describeError } from './logger.ts';
import { readDemo } from './demo/index.ts';
import { startServer } from './server.ts';

/** What the process that started us hears through its channel; a plain start has none. */
const tell = (message: Readonly<Record<string, unknown>>): void => {
  if (process.connected) process.send?.(message);
};

try {
  const config = readConfig(process.env);
  const log = createLogger(config.LOG_LEVEL);
  const running = await startServer(config, log);
  log.info(running.port === null ? 'Computing.' : `Listening on ${config.HOST}:${running.port}.`);
  const demo = config.DEMO ? await readDemo(running.services.database.manager) : null;
  tell({ ready: true, port: running.port, demo });

  let stopping = false;
  const stop = (): void => {
    if (stopping) return;
    stopping = true;
    running.stop().then(
      () => process.exit(0),
      (error: unknown) => {
        log.error('Stopping failed.', describeError(error));
        process.exit(1);
      },
    );
  };
  process.on('SIGINT', stop);
  process.on('SIGTERM', stop);
  process.on('disconnect', stop);
  process.on('unhandledRejection', (error) => log.error('A promise was left alone.', describeError(error)));
} catch (error) {
  const sentence = inOneSentence(error);
  process.stderr.write(`${sentence}\n`);
  tell({ failed: sentence });
  process.exit(1);
}

function inOneSentence(error: unknown): string {
  if (error instanceof ConfigError) return error.message;
  const { code, port } = error as { code?: string; port?: number };
  if (code === 'EADDRINUSE')
    return `Port ${port} is taken by another program; choose another one with PORT=….`;
  if (code === 'EACCES')
    return `Port ${port} may not be used by this account; choose one above 1023 with PORT=….`;
  if (code === 'ECONNREFUSED') return 'The database does not answer; is it running at DATABASE_URL?';
  if (code === '28P01') return 'The database refuses the password in DATABASE_URL.';
  return error instanceof Error ? (error.stack ?? error.message) : String(error);
}
