import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import pg from 'pg';
import * as schema from './schema/index';

export type Db = NodePgDatabase<typeof schema>;
export type Transaction = Parameters<Parameters<Db['transaction']>[0]>[0];
/** What a repository takes: the database, or a transaction that is open on it. */
export type Queryable = Db | Transaction;

export interface DatabaseOptions {
  readonly url: string;
  /** Most connections of this process; 10 unless told otherwise. */
  readonly connections?: number;
  /** Shown in pg_stat_activity. */
  readonly name?: string;
  /** Milliseconds that one statement may take; 30 s unless told otherwise. */
  readonly statementTimeout?: number;
  /** A connection was lost; the pool replaces it by itself. */
  readonly onError?: (error: Error) => void;
}

export interface Database {
  readonly db: Db;
  readonly pool: pg.Pool;
  readonly url: string;
  close(): Promise<void>;
}

/**
 * Opens a pool. Nothing is connected before the first query, and a lost connection is reported to
 * `onError` instead of ending the process.
 */
export function openDatabase(options: DatabaseOptions): Database {
  const onError = options.onError ?? (() => undefined);
  const pool = new pg.Pool({
    connectionString: options.url,
    application_name: options.name ?? 'heddle',
    max: options.connections ?? 10,
    connectionTimeoutMillis: 5_000,
    idleTimeoutMillis: 30_000,
    statement_timeout: options.statementTimeout ?? 30_000,
    lock_timeout: 10_000,
    idle_in_transaction_session_timeout: 30_000,
    keepAlive: true,
  });
  pool.on('error', onError);
  pool.on('connect', (client) => client.on('error', onError));
  return {
    db: drizzle(pool, { schema }),
    pool,
    url: options.url,
    close: () => pool.end(),
  };
}
