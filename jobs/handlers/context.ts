import type { Logger } from 'pino';
import type { Db } from '../../db/client';
import type { MailRule } from '../../db/repositories/runWork';
import type { Activity } from '../activity';
import type { WorkerConfig } from '../config';
import type { Networks } from '../networks';
import type { Pool } from '../pool/pool';

/** What the composition root hands to every handler. */
export interface Context {
  readonly config: WorkerConfig;
  readonly db: Db;
  readonly log: Logger;
  readonly activity: Activity;
  readonly networks: Networks;
  /** Threads that compute matrices. */
  readonly pool: Pool;
  /** A thread kept free for whoever clicked on a pair. */
  readonly pairPool: Pool;
  readonly mailRule: MailRule;
  /** Names this worker process in what it stores. */
  readonly workerName: string;
}
