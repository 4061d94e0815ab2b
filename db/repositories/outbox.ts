import { eq, sql } from 'drizzle-orm';
import type { Db, Queryable } from '../client';
import { outbox } from '../schema/index';

export type OutboxRow = typeof outbox.$inferSelect;

/** What may be asked of the queue: ids only. */
export type OutboxEntry =
  | { readonly kind: 'plan'; readonly payload: { runId: string; attempt: number } }
  | { readonly kind: 'blocks'; readonly payload: { runId: string; attempt: number } }
  | { readonly kind: 'focus'; readonly payload: { runId: string; attempt: number } }
  | { readonly kind: 'pair'; readonly payload: { runId: string; p: number; q: number } }
  | {
      readonly kind: 'estimate';
      readonly payload: { revisionId: string; maxDimension: number; partKey: string };
    }
  | {
      readonly kind: 'import_estimate';
      readonly payload: { importId: string; version: number };
    }
  | { readonly kind: 'mail'; readonly payload: { mailId: string } }
  | { readonly kind: 'beat'; readonly payload: Record<string, never> };

/**
 * Writes a row in the transaction that makes it necessary and wakes the relay when that commits.
 *
 * @param dispatchId names the job in the queue; a new one unless given
 */
export async function addToOutbox(
  db: Queryable,
  workspaceId: string | null,
  entry: OutboxEntry,
  dispatchId?: string,
): Promise<void> {
  await db.insert(outbox).values({ ...entry, workspaceId, ...(dispatchId && { dispatchId }) });
  await db.execute(sql`select pg_notify('outbox_added', '')`);
}

/**
 * Takes the oldest row that nobody else has taken, hands it to `dispatch` and deletes it in the same
 * transaction. If `dispatch` throws, the row stays.
 *
 * @returns false if there was none
 */
export async function takeFromOutbox(
  db: Db,
  dispatch: (row: OutboxRow) => Promise<void>,
): Promise<boolean> {
  return db.transaction(async (tx) => {
    const [row] = await tx
      .select()
      .from(outbox)
      .orderBy(outbox.id)
      .limit(1)
      .for('update', { skipLocked: true });
    if (!row) return false;
    await dispatch(row);
    await tx.delete(outbox).where(eq(outbox.id, row.id));
    return true;
  });
}

/** Asks for a beat unless one is under way or the last was consumed less than `seconds` ago. */
export async function askForBeat(db: Db, seconds: number): Promise<void> {
  await db.execute(sql`
    with asked as (
      insert into outbox (kind, payload)
      select 'beat', '{}'::jsonb
      where not exists (select 1 from outbox where kind = 'beat')
        and not exists (
          select 1 from beats
          where name = 'queue' and consumed_at > now() - make_interval(secs => ${seconds})
        )
      returning 1
    )
    select pg_notify('outbox_added', '') from asked`);
}
