import type { IncomingMessage } from 'node:http';
import type { Duplex } from 'node:stream';
import type { Router } from 'express';
import type { DataSource } from 'typeorm';
import type { Config } from './config/index.ts';
import type { Events } from './events.ts';
import type { RateLimits } from './http/rate-limit.ts';
import type { Logger } from './logger.ts';

/** What every module is given. */
export interface Services {
  readonly config: Config;
  readonly database: DataSource;
  readonly events: Events;
  readonly log: Logger;
  readonly limits: RateLimits;
}

/** What a module gives to the application; all parts are optional. */
export interface ServerModule {
  /** Mounted at the root; paths are written whole. */
  readonly routes?: Router;
  /** Takes a WebSocket upgrade and says so; false leaves it to the next module. */
  upgrade?(request: IncomingMessage, socket: Duplex, head: Buffer): boolean;
  /** Called once before the first request. */
  start?(): Promise<void>;
  /** Called in the opposite order; finishes what is under way. */
  stop?(): Promise<void>;
}
