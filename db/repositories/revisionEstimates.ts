import { and, eq, gt, isNull, lte, sql } from 'drizzle-orm';
import type { Db, Queryable } from '../client';
import { revisionEstimates } from '../schema/index';
import { addToOutbox } from './outbox';
import { partKey, type RunPart } from './runParts';
import type { Scope } from './scope';

/** Which estimate: a revision, the highest dimension D, 0..3, and the name of a part. */
export interface EstimateQuestion {
  readonly revisionId: string;
  readonly maxDimension: number;
  readonly partKey: string;
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
  { revisionId, maxDimension, partKey }: EstimateQuestion,
): Promise<EstimateAnswer | null> {
  const [row] = await db
    .select({ estimate: revisionEstimates.estimate, failure: revisionEstimates.failure })
    .from(revisionEstimates)
    .where(
      and(
        eq(revisionEstimates.workspaceId, scope.workspaceId),
        eq(revisionEstimates.revisionId, revisionId),
        eq(revisionEstimates.maxDimension, maxDimension),
        eq(revisionEstimates.partKey, partKey),
        gt(revisionEstimates.askedAt, KEPT),
      ),
    );
  if (!row) return null;
  if (row.failure !== null) return { kind: 'failed', failure: row.failure };
  return row.estimate === null ? { kind: 'waiting' } : { kind: 'answered', estimate: row.estimate };
}

/**
 * Puts the question once an hour, with the row that will enqueue it.
 * @param part canonical
 */
export async function askEstimate(
  db: Db,
  { workspaceId }: Scope,
  question: Omit<EstimateQuestion, 'partKey'>,
  part: RunPart,
): Promise<void> {
  const asking = { ...question, partKey: partKey(part) };
  await db.transaction(async (tx) => {
    const asked = await tx
      .insert(revisionEstimates)
      .values({ workspaceId, ...asking, part })
      .onConflictDoUpdate({
        target: [
          revisionEstimates.workspaceId,
          revisionEstimates.revisionId,
          revisionEstimates.maxDimension,
          revisionEstimates.partKey,
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
    await addToOutbox(tx, workspaceId, { kind: 'estimate', payload: asking });
  });
}

/**
 * Worker side: @returns workspace and part of the question and how often it was begun, now included;
 * null if it is answered.
 */
export async function claimEstimate(db: Db, question: EstimateQuestion): Promise<Claimed | null> {
  const [row] = await db
    .update(revisionEstimates)
    .set({ tries: sql`${revisionEstimates.tries} + 1`, dispatchedAt: sql`now()` })
    .where(unanswered(question))
    .returning({
      workspaceId: revisionEstimates.workspaceId,
      part: revisionEstimates.part,
      tries: revisionEstimates.tries,
    });
  return row ?? null;
}

export interface Claimed {
  readonly workspaceId: string;
  readonly part: RunPart;
  readonly tries: number;
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
    const name = estimateName(question);
    await tx.execute(sql`select pg_notify('estimate_answered', ${name})`);
  });
}

/** What `estimate_answered` carries. */
export const estimateName = ({ revisionId, maxDimension, partKey }: EstimateQuestion): string =>
  `${revisionId} ${maxDimension} ${partKey}`;

const unanswered = ({ revisionId, maxDimension, partKey }: EstimateQuestion) =>
  and(
    eq(revisionEstimates.partKey, partKey),
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
            and o.payload->>'partKey' = e.part_key
        )
      returning workspace_id, revision_id, max_dimension, part_key
    ), asked as (
      insert into outbox (kind, workspace_id, payload)
      select 'estimate', workspace_id,
        jsonb_build_object(
          'revisionId', revision_id, 'maxDimension', max_dimension, 'partKey', part_key
        ) from late
      returning 1
    )
    select pg_notify('outbox_added', '') from asked`);
}
