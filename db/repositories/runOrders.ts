import { and, eq, inArray, ne, sql } from 'drizzle-orm';
import { WHOLE, type RunFocus } from '#contract/enums';
import type { Db } from '../client';
import { runs } from '../schema/index';
import { addToOutbox } from './outbox';
import { announceRun } from './runs';
import { ofKeptDataset } from './deletion';
import type { Scope } from './scope';

export type { RunFocus };

/**
 * Makes a finished part run whole: what is stored stays, and a plan of the other pairs is asked for.
 * An extension that was stopped or failed is taken up again where it was.
 *
 * @returns whether this call did
 */
export async function extendRun(db: Db, scope: Scope, runId: string): Promise<boolean> {
  return db.transaction(async (tx) => {
    // A dataset that is being deleted takes its runs with it: the two take turns.
    await tx.execute(
      sql`select 1 from workspaces where id = ${scope.workspaceId} for no key update`,
    );
    const mine = and(
      eq(runs.workspaceId, scope.workspaceId),
      eq(runs.id, runId),
      ofKeptDataset(runs.revisionId),
    );
    const again = {
      state: 'queued' as const,
      attempt: sql`${runs.attempt} + 1`,
      dispatchId: sql`gen_random_uuid()`,
      dispatchedAt: sql`now()`,
      heartbeatAt: null,
      startedAt: null,
      finishedAt: null,
      failureCode: null,
      failureMessage: null,
    };
    const [extended] = await tx
      .update(runs)
      .set({
        ...again,
        extendedFrom: runs.part,
        part: WHOLE,
        blocksBefore: runs.blocksDone,
        pairsBefore: runs.pairsDone,
        blockCount: null,
        pairsTotal: sql`(select node_count * (node_count - 1) / 2 from revisions
          where revisions.id = ${runs.revisionId})`,
      })
      .where(and(mine, eq(runs.state, 'done'), ne(runs.part, WHOLE)))
      .returning();
    const [resumed] = extended
      ? []
      : await tx
          .update(runs)
          .set(again)
          .where(
            and(
              mine,
              inArray(runs.state, ['stopped', 'failed']),
              sql`${runs.extendedFrom} is not null`,
            ),
          )
          .returning();
    const run = extended ?? resumed;
    if (!run) return false;
    const kind = run.blockCount === null ? 'plan' : 'blocks';
    const payload = { runId, attempt: run.attempt };
    await addToOutbox(tx, scope.workspaceId, { kind, payload }, run.dispatchId);
    await announceRun(tx, runId);
    return true;
  });
}

/**
 * Stores what a reader looks at and asks that its pairs go first.
 * @returns false if the run is over or not there
 */
export async function setFocus(
  db: Db,
  scope: Scope,
  runId: string,
  focus: RunFocus,
): Promise<boolean> {
  return db.transaction(async (tx) => {
    const [run] = await tx
      .update(runs)
      .set({ focus })
      .where(
        and(
          eq(runs.workspaceId, scope.workspaceId),
          eq(runs.id, runId),
          inArray(runs.state, ['queued', 'running']),
        ),
      )
      .returning({ attempt: runs.attempt });
    if (!run) return false;
    const payload = { runId, attempt: run.attempt };
    await addToOutbox(tx, scope.workspaceId, { kind: 'focus', payload });
    return true;
  });
}
