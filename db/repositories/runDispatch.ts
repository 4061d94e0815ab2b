import { and, eq, inArray, sql } from 'drizzle-orm';
import type { RunFocus } from '#contract/enums';
import type { Db } from '../client';
import { runs } from '../schema/index';
import { addToOutbox } from './outbox';
import { announceRun } from './runs';
import type { Fence } from './runWork';

/** Moves the heartbeat of these runs forward. @returns those that may go on; the others are over. */
export async function heartbeat(db: Db, fences: readonly Fence[]): Promise<Fence[]> {
  if (fences.length === 0) return [];
  const ids = sql.join(
    fences.map(({ runId, attempt }) => sql`(${runId}::uuid, ${attempt}::integer)`),
    sql`, `,
  );
  const { rows } = await db.execute<{ id: string; attempt: number }>(sql`
    update runs set heartbeat_at = now()
    where state = 'running' and (id, attempt) in (${ids})
    returning id, attempt`);
  return rows.map(({ id, attempt }) => ({ runId: id, attempt }));
}

/** The dispatch has reached the queue: from now on its jobs must exist. */
export async function markDispatched(db: Db, fence: Fence): Promise<void> {
  await db
    .update(runs)
    .set({ dispatchedAt: sql`now()` })
    .where(and(eq(runs.id, fence.runId), eq(runs.attempt, fence.attempt)));
}

export interface SilentRun extends Fence {
  readonly dispatchId: string;
  /** Null: the plan is what is missing. */
  readonly blockCount: number | null;
}

/** @returns unfinished runs on which nobody has worked for so long and that the outbox does not hold. */
export async function listSilent(db: Db, seconds: number): Promise<SilentRun[]> {
  const { rows } = await db.execute<{
    id: string;
    attempt: number;
    dispatch_id: string;
    block_count: number | null;
  }>(sql`
    select id, attempt, dispatch_id, block_count from runs
    where state in ('queued', 'running')
      and greatest(coalesce(heartbeat_at, dispatched_at), dispatched_at)
        < now() - make_interval(secs => ${seconds})
      and not exists (
        select 1 from outbox o
        where o.kind in ('plan', 'blocks') and o.payload->>'runId' = runs.id::text
      )
    order by created_at limit 200`);
  return rows.map((row) => ({
    runId: row.id,
    attempt: row.attempt,
    dispatchId: row.dispatch_id,
    blockCount: row.block_count,
  }));
}

/**
 * Begins the next attempt under a new dispatch id; what is stored stays, and only what is missing
 * is asked for again.
 *
 * @returns false if somebody else did, or the run is over
 */
export async function beginNextAttempt(db: Db, silent: Fence): Promise<boolean> {
  return db.transaction(async (tx) => {
    const [run] = await tx
      .update(runs)
      .set({
        attempt: sql`${runs.attempt} + 1`,
        dispatchId: sql`gen_random_uuid()`,
        dispatchedAt: sql`now()`,
        heartbeatAt: null,
      })
      .where(
        and(
          eq(runs.id, silent.runId),
          eq(runs.attempt, silent.attempt),
          inArray(runs.state, ['queued', 'running']),
        ),
      )
      .returning();
    if (!run) return false;
    await addToOutbox(
      tx,
      run.workspaceId,
      {
        kind: run.blockCount === null ? 'plan' : 'blocks',
        payload: { runId: run.id, attempt: run.attempt },
      },
      run.dispatchId,
    );
    await announceRun(tx, run.id);
    return true;
  });
}

/** @returns the dispatch id if the run is still unfinished at this attempt, else null. */
export async function findDispatch(db: Db, fence: Fence): Promise<string | null> {
  const [row] = await db
    .select({ dispatchId: runs.dispatchId })
    .from(runs)
    .where(
      and(
        eq(runs.id, fence.runId),
        eq(runs.attempt, fence.attempt),
        inArray(runs.state, ['queued', 'running']),
      ),
    );
  return row?.dispatchId ?? null;
}

/** @returns what somebody looks at while the run goes, and its latest dispatch; null if nobody does. */
export async function findFocus(
  db: Db,
  runId: string,
): Promise<{ readonly focus: RunFocus; readonly dispatchId: string } | null> {
  const [row] = await db
    .select({ focus: runs.focus, dispatchId: runs.dispatchId })
    .from(runs)
    .where(and(eq(runs.id, runId), inArray(runs.state, ['queued', 'running'])));
  return row?.focus ? { focus: row.focus, dispatchId: row.dispatchId } : null;
}
