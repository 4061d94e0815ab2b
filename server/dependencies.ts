import type { Instance } from '#contract/accounts';
import type { Logger } from 'pino';
import type { Database } from '../db/client';
import type { Throttle } from './auth/throttle';
import type { ServerConfig } from './config';
import type { UploadFolder } from './datasets/upload';
import type { Reader } from './reading/reader';

/** What the composition root hands to every part of the server. */
export interface Dependencies {
  readonly config: ServerConfig;
  readonly database: Database;
  readonly log: Logger;
  readonly throttle: Throttle;
  readonly uploads: UploadFolder;
  /** Reads uploaded files in a process of its own. */
  readonly reader: Reader;
  /** The invented accounts of a demo instance; null everywhere else. */
  readonly demoAccounts: Instance['demoAccounts'];
  /** Seconds since a worker last consumed a job, or null if none ever did; what `/ready` reads. */
  readonly secondsSinceJob: () => Promise<number | null>;
  /** Aborted when the server begins to close; open streams end then. */
  readonly closing: AbortSignal;
}
