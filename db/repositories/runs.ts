import { and, desc, eq, inArray, or, sql } from 'drizzle-orm';
import type { RunPart, Scale } from '#contract/enums';
import type { Db, Queryable } from '../client';
import { beats, datasets, revisions, runs, users } from '../schema/index';
import { ofKeptDataset } from './deletion';
import { addToOutbox } from './outbox';
import { partKey } from './runParts';
import type { Scope } from './scope';

export type RunRow = typeof runs.$inferSelect;

/** A run with what its page says about the network it was made from. */
export interface RunView extends Pick<
  RunRow,
  | 'id'
  | 'workspaceId'
  | 'revisionId'
  | 'number'
  | 'scale'
  | 'dimensions'
  | 'part'
  | 'extendedFrom'
  | 'blocksBefore'
  | 'engineVersion'
  | 'state'
  | 'pairsTotal'
  | 'blockCount'
  | 'pairsDone'
  | 'failureCode'
  | 'failureMessage'
  | 'createdAt'
  | 'startedAt'
  | 'finishedAt'
> {
  readonly datasetId: string;
  readonly datasetName: string;
  readonly invented: boolean;
  readonly revisionNumber: number;
  readonly contentHash: string;
  readonly nodeCount: number;
  readonly requestedByName: string | null;
}

export interface NewRun {
  readonly revisionId: string;
  readonly scale: Scale;
  /** Ascending. */
  readonly dimensions: readonly number[];
  /** Canonical. */
  readonly part: RunPart;
  /** The same key of the same person means the same run. */
  readonly idempotencyKey: string | null;
}

/** `repeated`: the same key. `found`: an equal run is stored or under way, so none was made. */
export type CreatedRun =
  | { readonly kind: 'created' | 'repeated' | 'found'; readonly runId: string }
  | { readonly kind: 'no_revision' | 'other_parameters' };

/** Tells every listener that a run has changed, when the transaction commits. */
export async function announceRun(db: Queryable, runId: string): Promise<void> {
  await db.execute(sql`select pg_notify('run_changed', ${runId})`);
}

/** Writes a queued run and the row that will enqueue its plan, in one transaction. */
export async function createRun(db: Db, scope: Scope, wanted: NewRun): Promise<CreatedRun> {
  const { userId, workspaceId } = scope;
  return db.transaction(async (tx) => {
    // Submissions of a workspace take turns: its numbers have no gaps and a repeat sees the first.
    await tx.execute(sql`select 1 from workspaces where id = ${workspaceId} for no key update`);
    const earlier = await findByKey(tx, scope, wanted.idempotencyKey);
    if (earlier) {
      const same =
        earlier.revisionId === wanted.revisionId &&
        earlier.scale === wanted.scale &&
        earlier.dimensions.join() === wanted.dimensions.join() &&
        [earlier.part, earlier.extendedFrom].some((part) => samePart(part, wanted.part));
      return same ? { kind: 'repeated', runId: earlier.id } : { kind: 'other_parameters' };
    }
    const [revision] = await tx
      .select({ nodeCount: revisions.nodeCount })
      .from(revisions)
      .where(
        and(
          eq(revisions.workspaceId, workspaceId),
          eq(revisions.id, wanted.revisionId),
          ofKeptDataset(revisions.id),
        ),
      );
    if (!revision) return { kind: 'no_revision' };
    const equal = await findEqual(tx, workspaceId, wanted);
    if (equal !== null) return { kind: 'found', runId: equal };
    const { nodeCount } = revision;
    const [row] = await tx
      .insert(runs)
      .values({
        workspaceId,
        revisionId: wanted.revisionId,
        number: sql`(select coalesce(max(number), 0) + 1 from runs where workspace_id = ${workspaceId})`,
        scale: wanted.scale,
        dimensions: [...wanted.dimensions],
        part: wanted.part,
        attempt: 1,
        pairsTotal: wanted.part.kind === 'whole' ? (nodeCount * (nodeCount - 1)) / 2 : 0,
        idempotencyKey: wanted.idempotencyKey,
        requestedBy: userId,
      })
      .returning({ id: runs.id, dispatchId: runs.dispatchId });
    if (!row) throw new Error('An inserted run was not returned.');
    await addToOutbox(
      tx,
      workspaceId,
      { kind: 'plan', payload: { runId: row.id, attempt: 1 } },
      row.dispatchId,
    );
    await announceRun(tx, row.id);
    return { kind: 'created', runId: row.id };
  });
}

const samePart = (part: RunPart | null, wanted: RunPart): boolean =>
  part !== null && partKey(part) === partKey(wanted);

/**
 * The newest run of the same revision, scale, dimensions and pairs that is done or under way, by the
 * engine that the workers have now. One that was extended holds the pairs of its earlier part too.
 */
async function findEqual(
  db: Queryable,
  workspaceId: string,
  { revisionId, scale, dimensions, part }: NewRun,
): Promise<string | null> {
  const wanted = sql`${JSON.stringify(part)}::jsonb`;
  const current = sql`(select ${beats.engineVersion} from ${beats} where ${beats.name} = 'queue')`;
  const [row] = await db
    .select({ id: runs.id })
    .from(runs)
    .where(
      and(
        eq(runs.workspaceId, workspaceId),
        eq(runs.revisionId, revisionId),
        eq(runs.scale, scale),
        eq(runs.dimensions, [...dimensions]),
        or(eq(runs.part, wanted), eq(runs.extendedFrom, wanted)),
        inArray(runs.state, ['queued', 'running', 'done']),
        // Empty until it is planned, which the workers of now will do.
        sql`${runs.engineVersion} in ('', coalesce(${current}, ${runs.engineVersion}))`,
      ),
    )
    .orderBy(desc(runs.number))
    .limit(1);
  return row?.id ?? null;
}

/** Whether this person has a run under the key already. */
export async function hasRunUnderKey(db: Db, scope: Scope, key: string | null): Promise<boolean> {
  return (await findByKey(db, scope, key)) !== null;
}

async function findByKey(db: Queryable, scope: Scope, key: string | null) {
  if (key === null) return null;
  const [row] = await db
    .select()
    .from(runs)
    .where(
      and(
        eq(runs.workspaceId, scope.workspaceId),
        eq(runs.requestedBy, scope.userId),
        eq(runs.idempotencyKey, key),
      ),
    );
  return row ?? null;
}

/** @returns the run, or null if the workspace has no such run. */
export async function findRun(db: Queryable, scope: Scope, runId: string): Promise<RunView | null> {
  const [row] = await db
    .select({
      id: runs.id,
      workspaceId: runs.workspaceId,
      revisionId: runs.revisionId,
      number: runs.number,
      scale: runs.scale,
      dimensions: runs.dimensions,
      part: runs.part,
      extendedFrom: runs.extendedFrom,
      blocksBefore: runs.blocksBefore,
      engineVersion: runs.engineVersion,
      state: runs.state,
      pairsTotal: runs.pairsTotal,
      blockCount: runs.blockCount,
      pairsDone: runs.pairsDone,
      failureCode: runs.failureCode,
      failureMessage: runs.failureMessage,
      createdAt: runs.createdAt,
      startedAt: runs.startedAt,
      finishedAt: runs.finishedAt,
      datasetId: datasets.id,
      datasetName: datasets.name,
      invented: datasets.invented,
      revisionNumber: revisions.number,
      contentHash: revisions.contentHash,
      nodeCount: revisions.nodeCount,
      requestedByName: users.name,
    })
    .from(runs)
    .innerJoin(revisions, eq(revisions.id, runs.revisionId))
    .innerJoin(datasets, eq(datasets.id, revisions.datasetId))
    .leftJoin(users, eq(users.id, runs.requestedBy))
    .where(isReadable(scope, runId));
  return row ?? null;
}

/** What a progress event needs; the counters are those of one moment. */
export type RunProgress = Pick<
  RunRow,
  | 'state'
  | 'pairsDone'
  | 'pairsTotal'
  | 'pairsBefore'
  | 'blockCount'
  | 'blocksDone'
  | 'failureCode'
  | 'failureMessage'
> & {
  /** Milliseconds since the run was started by a worker; null before. */
  readonly runningFor: number | null;
};

export async function findProgress(
  db: Queryable,
  scope: Scope,
  runId: string,
): Promise<RunProgress | null> {
  const [row] = await db
    .select({
      state: runs.state,
      pairsDone: runs.pairsDone,
      pairsTotal: runs.pairsTotal,
      pairsBefore: runs.pairsBefore,
      blockCount: runs.blockCount,
      blocksDone: runs.blocksDone,
      failureCode: runs.failureCode,
      failureMessage: runs.failureMessage,
      runningFor: sql<
        number | null
      >`(extract(epoch from now() - ${runs.startedAt}) * 1000)::float8`,
    })
    .from(runs)
    .where(isReadable(scope, runId));
  return row ?? null;
}

/** @returns the stored barcode of the recorded order, null before the plan, undefined without a run. */
export async function findBarcode(
  db: Queryable,
  scope: Scope,
  runId: string,
): Promise<Uint8Array | null | undefined> {
  const [row] = await db
    .select({ barcode: runs.barcode })
    .from(runs)
    .where(isReadable(scope, runId));
  return row?.barcode;
}

const isReadable = (scope: Scope, runId: string) =>
  and(eq(runs.workspaceId, scope.workspaceId), eq(runs.id, runId), ofKeptDataset(runs.revisionId));

/** Ends an unfinished run at once. @returns whether this call ended it. */
export async function stopRun(db: Db, scope: Scope, runId: string): Promise<boolean> {
  return db.transaction(async (tx) => {
    const stopped = await tx
      .update(runs)
      .set({ state: 'stopped', finishedAt: sql`now()` })
      .where(
        and(
          eq(runs.workspaceId, scope.workspaceId),
          eq(runs.id, runId),
          inArray(runs.state, ['queued', 'running']),
        ),
      )
      .returning({ id: runs.id });
    if (stopped.length > 0) await announceRun(tx, runId);
    return stopped.length > 0;
  });
}
