import { createServer, type IncomingMessage, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { Duplex } from 'node:stream';
import { fileURLToPath } from 'node:url';
import { createApp } from './app.ts';
import { createModules, createServices } from './compose.ts';
import type { Config } from './config/index.ts';
import { describeError, type Logger } from './logger.ts';
import type { ServerModule, Services } from './services.ts';

/** Where the client's build is found beside the server's. */
const builtClient = fileURLToPath(new URL('../../client/dist', import.meta.url));

export interface RunningServer {
  readonly services: Services;
  /** The port it listens on; null for a process that only computes. */
  readonly port: number | null;
  /** Stops taking requests, finishes what is under way, closes everything it opened. */
  stop(): Promise<void>;
}

/** Starts everything one process does, and returns once it answers. */
export async function startServer(config: Config, log: Logger): Promise<RunningServer> {
  const services = await createServices(config, log);
  const modules = createModules(services);
  const started: ServerModule[] = [];
  let server: Server | null = null;

  const stop = async (): Promise<void> => {
    const closed = server === null ? Promise.resolve() : close(server);
    for (const module of started.reverse()) {
      await module
        .stop?.()
        .catch((error: unknown) => log.warn('A part did not stop well.', describeError(error)));
    }
    await closed;
    await services.events.stop();
    await services.database.destroy();
  };

  try {
    await services.events.start();
    for (const module of modules) {
      started.push(module);
      await module.start?.();
    }
    if (config.PROCESS !== 'worker') {
      server = createServer(createApp(services, modules, config.CLIENT_FOLDER ?? builtClient));
      server.on('upgrade', upgradeTo(modules));
      await listen(server, config);
    }
  } catch (error) {
    await stop();
    throw error;
  }
  const port = server === null ? null : (server.address() as AddressInfo).port;
  return { services, port, stop };
}

/** Offers an upgrade to each module in turn; what nobody takes is refused. */
function upgradeTo(modules: readonly ServerModule[]) {
  return (request: IncomingMessage, socket: Duplex, head: Buffer): void => {
    socket.on('error', () => socket.destroy());
    if (modules.some((module) => module.upgrade?.(request, socket, head) ?? false)) return;
    socket.end('HTTP/1.1 404 Not Found\r\nConnection: close\r\n\r\n');
  };
}

function listen(server: Server, { HOST, PORT }: Config): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(PORT, HOST, () => {
      server.off('error', reject);
      resolve();
    });
  });
}

/** Requests under way get a moment; connections kept open without one are closed at once. */
function close(server: Server): Promise<void> {
  return new Promise((resolve) => {
    const force = setTimeout(() => server.closeAllConnections(), 3_000);
    server.close(() => {
      clearTimeout(force);
      resolve();
    });
    server.closeIdleConnections();
  });
}
