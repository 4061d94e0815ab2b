import { and, eq, gt, isNull, lte, sql } from 'drizzle-orm';
import type { Db, Queryable } from '../client';
import { revisionEstimates } from '../schema/index';
import { addToOutbox } from './outbox';
import type { Scope } from './scope';

/** Which estimate: a revision and the highest dimension D, 0..3. */
export interface EstimateQuestion {
  readonly revisionId: string;
  readonly maxDimension: number;
}

export type EstimateAnswer =
  | { readonly kind: 'waiting' }
  | { readonly kind: 'answered'; readonly estimate: unknown }
  | { readonly kind: 'failed'; readonly failure: string };

/** An answer holds so long: the limits of the workers may be set anew. */
const KEPT = sql`now() - interval '1 hour'`;

/** @returns what is known, or null if nobody asked within the last hour. */
export async function findEstimate(
  db: Queryable,
  scope: Scope,
  { revisionId, maxDimension }: EstimateQuestion,
): Promise<EstimateAnswer | null> {
  const [row] = await db
    .select({ estimate: revisionEstimates.estimate, failure: revisionEstimates.failure })
    .from(revisionEstimates)
    .where(
      and(
        eq(revisionEstimates.workspaceId, scope.workspaceId),
        eq(revisionEstimates.revisionId, revisionId),
        eq(revisionEstimates.maxDimension, maxDimension),
        gt(revisionEstimates.askedAt, KEPT),
      ),
    );
  if (!row) return null;
  if (row.failure !== null) return { kind: 'failed', failure: row.failure };
  return row.estimate === null ? { kind: 'waiting' } : { kind: 'answered', estimate: row.estimate };
}

/** Puts the question once an hour, with the row that will enqueue it. */
export async function askEstimate(
  db: Db,
  { workspaceId }: Scope,
  { revisionId, maxDimension }: EstimateQuestion,
): Promise<void> {
  await db.transaction(async (tx) => {
    const asked = await tx
      .insert(revisionEstimates)
      .values({ workspaceId, revisionId, maxDimension })
      .onConflictDoUpdate({
        target: [
          revisionEstimates.workspaceId,
          revisionEstimates.revisionId,
          revisionEstimates.maxDimension,
        ],
        set: {
          estimate: null,
          failure: null,
          tries: 0,
          dispatchedAt: sql`now()`,
          askedAt: sql`now()`,
        },
        setWhere: lte(revisionEstimates.askedAt, KEPT),
      })
      .returning({ maxDimension: revisionEstimates.maxDimension });
    if (asked.length === 0) return;
    await addToOutbox(tx, workspaceId, { kind: 'estimate', payload: { revisionId, maxDimension } });
  });
}

/**
 * Worker side: @returns the workspace of the question and how often it was begun, now included; null
 * if it is answered.
 */
export async function claimEstimate(
  db: Db,
  question: EstimateQuestion,
): Promise<{ readonly workspaceId: string; readonly tries: number } | null> {
  const [row] = await db
    .update(revisionEstimates)
    .set({ tries: sql`${revisionEstimates.tries} + 1`, dispatchedAt: sql`now()` })
    .where(unanswered(question))
    .returning({ workspaceId: revisionEstimates.workspaceId, tries: revisionEstimates.tries });
  return row ?? null;
}

/** Worker side: stores the first answer and tells who waits for it. */
export async function answerEstimate(
  db: Db,
  question: EstimateQuestion,
  answer: { readonly estimate: unknown } | { readonly failure: string },
): Promise<void> {
  await db.transaction(async (tx) => {
    const stored = await tx
      .update(revisionEstimates)
      .set(answer)
      .where(unanswered(question))
      .returning({ maxDimension: revisionEstimates.maxDimension });
    if (stored.length === 0) return;
    const name = `${question.revisionId} ${question.maxDimension}`;
    await tx.execute(sql`select pg_notify('estimate_answered', ${name})`);
  });
}

const unanswered = ({ revisionId, maxDimension }: EstimateQuestion) =>
  and(
    eq(revisionEstimates.revisionId, revisionId),
    eq(revisionEstimates.maxDimension, maxDimension),
    isNull(revisionEstimates.estimate),
    isNull(revisionEstimates.failure),
  );

/** Asks again for estimates whose job was lost. */
export async function redispatchEstimates(db: Db, seconds: number): Promise<void> {
  await db.execute(sql`
    with late as (
      update revision_estimates e set dispatched_at = now()
      where estimate is null and failure is null
        and dispatched_at < now() - make_interval(secs => ${seconds})
        and not exists (
          select 1 from outbox o
          where o.kind = 'estimate' and o.payload->>'revisionId' = e.revision_id::text
            and o.payload->>'maxDimension' = e.max_dimension::text
        )
      returning workspace_id, revision_id, max_dimension
    ), asked as (
      insert into outbox (kind, workspace_id, payload)
      select 'estimate', workspace_id,
        jsonb_build_object('revisionId', revision_id, 'maxDimension', max_dimension) from late
      returning 1
    )
    select pg_notify('outbox_added', '') from asked`);
}
