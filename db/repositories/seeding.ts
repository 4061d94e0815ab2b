import { sql } from 'drizzle-orm';
import type { Db } from '../client';

/** Argument of pg_advisory_xact_lock: held while demo data are made. */
const SEED_LOCK = 4_733_552;

/** Runs `work` while no other process does the same; `work` uses connections of its own. */
export async function withSeedLock<T>(db: Db, work: () => Promise<T>): Promise<T> {
  return db.transaction(async (transaction) => {
    await transaction.execute(sql`select pg_advisory_xact_lock(${SEED_LOCK})`);
    return work();
  });
}
