import { openDatabase } from '../../../db/client';
import { runBlocks } from '../../../db/schema/index';

/** What one worker process has stored of a run. */
export interface Share {
  readonly blocks: number;
  readonly pairs: number;
  /** Estimated seconds of one thread. */
  readonly estimated: number;
}

/** The shares of the workers in a run, the largest first. */
export async function sharesOf(databaseUrl: string, runId: string): Promise<Share[]> {
  const database = openDatabase({ url: databaseUrl });
  const { pairs, cost, storedBy, runId: ofRun } = runBlocks;
  const rows = await database.db.select({ pairs, cost, storedBy, ofRun }).from(runBlocks);
  await database.close();
  const shares = new Map<string | null, Share>();
  for (const row of rows) {
    if (row.ofRun !== runId) continue;
    const share = shares.get(row.storedBy) ?? { blocks: 0, pairs: 0, estimated: 0 };
    shares.set(row.storedBy, {
      blocks: share.blocks + 1,
      pairs: share.pairs + row.pairs,
      estimated: share.estimated + row.cost,
    });
  }
  return [...shares.values()].sort((one, other) => other.estimated - one.estimated);
}
