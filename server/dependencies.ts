import type { Logger } from 'pino';
import type { Database } from '../db/client';
import type { ServerConfig } from './config';

/** What the composition root hands to every part of the server. */
export interface Dependencies {
  readonly config: ServerConfig;
  readonly database: Database;
  readonly log: Logger;
  /** Aborted when the server begins to close; open streams end then. */
  readonly closing: AbortSignal;
}
