import { and, eq, isNull, sql } from 'drizzle-orm';
import type { Db, Queryable } from '../client';
import { pairDetails } from '../schema/index';
import { addToOutbox } from './outbox';
import type { Scope } from './scope';

export type PairAnswer =
  | { readonly kind: 'waiting' }
  | { readonly kind: 'answered'; readonly detail: unknown }
  | { readonly kind: 'failed'; readonly failure: string };

/** Arrival positions of a swap, p < q. */
export interface Positions {
  readonly p: number;
  readonly q: number;
}

/** @returns what is known about the swap, or null if nobody asked yet. */
export async function findAnswer(
  db: Queryable,
  scope: Scope,
  runId: string,
  { p, q }: Positions,
): Promise<PairAnswer | null> {
  const [row] = await db
    .select({ detail: pairDetails.detail, failure: pairDetails.failure })
    .from(pairDetails)
    .where(
      and(
        eq(pairDetails.workspaceId, scope.workspaceId),
        eq(pairDetails.runId, runId),
        eq(pairDetails.p, p),
        eq(pairDetails.q, q),
      ),
    );
  if (!row) return null;
  if (row.failure !== null) return { kind: 'failed', failure: row.failure };
  return row.detail === null ? { kind: 'waiting' } : { kind: 'answered', detail: row.detail };
}

/** Puts the question once, with the row that will enqueue it. */
export async function askPair(
  db: Db,
  scope: Scope,
  runId: string,
  { p, q }: Positions,
): Promise<void> {
  const { workspaceId } = scope;
  await db.transaction(async (tx) => {
    const asked = await tx
      .insert(pairDetails)
      .values({ workspaceId, runId, p, q })
      .onConflictDoNothing()
      .returning({ p: pairDetails.p });
    if (asked.length === 0) return;
    await addToOutbox(tx, workspaceId, { kind: 'pair', payload: { runId, p, q } });
  });
}

/** Worker side: @returns how often the question was begun, now included; null if it is answered. */
export async function claimPair(
  db: Db,
  runId: string,
  { p, q }: Positions,
): Promise<number | null> {
  const [row] = await db
    .update(pairDetails)
    .set({ tries: sql`${pairDetails.tries} + 1`, dispatchedAt: sql`now()` })
    .where(unanswered(runId, { p, q }))
    .returning({ tries: pairDetails.tries });
  return row?.tries ?? null;
}

/** Worker side: stores the first answer and tells who waits for it. */
export async function answerPair(
  db: Db,
  runId: string,
  positions: Positions,
  answer: { readonly detail: unknown } | { readonly failure: string },
): Promise<void> {
  await db.transaction(async (tx) => {
    const stored = await tx
      .update(pairDetails)
      .set(answer)
      .where(unanswered(runId, positions))
      .returning({ p: pairDetails.p });
    if (stored.length === 0) return;
    const name = `${runId} ${positions.p} ${positions.q}`;
    await tx.execute(sql`select pg_notify('pair_answered', ${name})`);
  });
}

const unanswered = (runId: string, { p, q }: Positions) =>
  and(
    eq(pairDetails.runId, runId),
    eq(pairDetails.p, p),
    eq(pairDetails.q, q),
    isNull(pairDetails.detail),
    isNull(pairDetails.failure),
  );

/** Asks again for swaps whose job was lost. */
export async function redispatchPairs(db: Db, seconds: number): Promise<void> {
  await db.execute(sql`
    with late as (
      update pair_details d set dispatched_at = now()
      where detail is null and failure is null
        and dispatched_at < now() - make_interval(secs => ${seconds})
        and not exists (
          select 1 from outbox o
          where o.kind = 'pair' and o.payload->>'runId' = d.run_id::text
            and o.payload->>'p' = d.p::text and o.payload->>'q' = d.q::text
        )
      returning workspace_id, run_id, p, q
    ), asked as (
      insert into outbox (kind, workspace_id, payload)
      select 'pair', workspace_id, jsonb_build_object('runId', run_id, 'p', p, 'q', q) from late
      returning 1
    )
    select pg_notify('outbox_added', '') from asked`);
}
