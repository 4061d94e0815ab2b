import { and, desc, eq, gt, inArray, isNotNull, isNull, lte, sql } from 'drizzle-orm';
import type { Db, Queryable, Transaction } from '../client';
import { datasets, pairDetails, revisionEstimates, revisions, runs } from '../schema/index';
import { announceRun } from './runs';
import type { Scope } from './scope';

/** A deleted dataset can be restored for so long, then it is purged. */
const GRACE = sql`interval '30 days'`;

const isMine = (scope: Scope, datasetId: string) =>
  and(eq(datasets.workspaceId, scope.workspaceId), eq(datasets.id, datasetId));
const restorable = gt(datasets.deletedAt, sql`now() - ${GRACE}`);

/** Takes a dataset out of the list; one that is archived stays so. @returns false if missing */
export async function archiveDataset(
  db: Queryable,
  scope: Scope,
  datasetId: string,
): Promise<boolean> {
  const rows = await db
    .update(datasets)
    .set({ archivedAt: sql`coalesce(${datasets.archivedAt}, now())` })
    .where(and(isMine(scope, datasetId), isNull(datasets.deletedAt)))
    .returning({ id: datasets.id });
  return rows.length === 1;
}

/**
 * Brings a deleted dataset back as it was, archived or not, or one that is only archived back to the
 * list. @returns false if missing, or deleted too long ago
 */
export async function restoreDataset(
  db: Queryable,
  scope: Scope,
  datasetId: string,
): Promise<boolean> {
  const rows = await db
    .update(datasets)
    .set({
      archivedAt: sql`case when ${datasets.deletedAt} is null then null else ${datasets.archivedAt} end`,
      deletedAt: null,
    })
    .where(and(isMine(scope, datasetId), sql`(${datasets.deletedAt} is null or ${restorable})`))
    .returning({ id: datasets.id });
  return rows.length === 1;
}

/**
 * Hides a dataset everywhere and stops what is being computed of it, in one transaction: what a
 * worker still has in hand is not stored. @returns false if missing
 */
export async function deleteDataset(db: Db, scope: Scope, datasetId: string): Promise<boolean> {
  return db.transaction(async (tx) => {
    await beginEnd(tx, scope);
    const rows = await tx
      .update(datasets)
      .set({ deletedAt: sql`now()` })
      .where(and(isMine(scope, datasetId), isNull(datasets.deletedAt)))
      .returning({ id: datasets.id });
    if (rows.length === 0) return false;
    await stopWork(tx, scope, datasetId);
    return true;
  });
}

export interface DeletedDataset {
  readonly id: string;
  readonly name: string;
  readonly invented: boolean;
  readonly deletedAt: Date;
  readonly restorableUntil: Date;
}

/** What was deleted and can be restored, latest first. */
export async function listDeletedDatasets(db: Queryable, scope: Scope): Promise<DeletedDataset[]> {
  const rows = await db
    .select({
      id: datasets.id,
      name: datasets.name,
      invented: datasets.invented,
      deletedAt: datasets.deletedAt,
      restorableUntil: sql`${datasets.deletedAt} + ${GRACE}`.mapWith(datasets.createdAt),
    })
    .from(datasets)
    .where(and(eq(datasets.workspaceId, scope.workspaceId), restorable))
    .orderBy(desc(datasets.deletedAt));
  return rows.flatMap(({ deletedAt, ...row }) => (deletedAt ? [{ ...row, deletedAt }] : []));
}

/** The names in use in the workspace, also of archived and of deleted datasets. */
export async function listNamesWithDeleted(
  db: Queryable,
  scope: Scope,
): Promise<ReadonlySet<string>> {
  const rows = await db
    .select({ name: datasets.name })
    .from(datasets)
    .where(eq(datasets.workspaceId, scope.workspaceId));
  return new Set(rows.map(({ name }) => name));
}

/** The name of a dataset, deleted or not, as it must be typed to purge it; null if missing. */
export async function findNameToPurge(
  db: Queryable,
  scope: Scope,
  datasetId: string,
): Promise<string | null> {
  const rows = await db
    .select({ name: datasets.name })
    .from(datasets)
    .where(isMine(scope, datasetId));
  return rows[0]?.name ?? null;
}

/** Removes a dataset, deleted or not, with all that belongs to it. @returns false if missing */
export async function purgeDataset(db: Db, scope: Scope, datasetId: string): Promise<boolean> {
  return db.transaction(async (tx) => {
    await beginEnd(tx, scope);
    await stopWork(tx, scope, datasetId);
    const rows = await tx
      .delete(datasets)
      .where(isMine(scope, datasetId))
      .returning({ id: datasets.id });
    return rows.length === 1;
  });
}

/** Removes what can no longer be restored, in every workspace. @returns how many datasets */
export async function purgeExpiredDatasets(db: Queryable): Promise<number> {
  const rows = await db
    .delete(datasets)
    .where(and(isNotNull(datasets.deletedAt), lte(datasets.deletedAt, sql`now() - ${GRACE}`)))
    .returning({ id: datasets.id });
  return rows.length;
}

/** Submissions of the workspace wait: none begins a run of a dataset that is going. */
const beginEnd = (tx: Transaction, { workspaceId }: Scope) =>
  tx.execute(sql`select 1 from workspaces where id = ${workspaceId} for no key update`);

async function stopWork(tx: Transaction, { workspaceId }: Scope, datasetId: string): Promise<void> {
  const revisionIds = tx
    .select({ id: revisions.id })
    .from(revisions)
    .where(and(eq(revisions.workspaceId, workspaceId), eq(revisions.datasetId, datasetId)));
  const stopped = await tx
    .update(runs)
    .set({ state: 'stopped', finishedAt: sql`now()` })
    .where(and(inArray(runs.revisionId, revisionIds), inArray(runs.state, ['queued', 'running'])))
    .returning({ id: runs.id });
  const runIds = tx.select({ id: runs.id }).from(runs).where(inArray(runs.revisionId, revisionIds));
  // Questions without an answer: nobody will read it.
  await tx
    .delete(pairDetails)
    .where(
      and(
        inArray(pairDetails.runId, runIds),
        isNull(pairDetails.detail),
        isNull(pairDetails.failure),
      ),
    );
  await tx
    .delete(revisionEstimates)
    .where(
      and(
        inArray(revisionEstimates.revisionId, revisionIds),
        isNull(revisionEstimates.estimate),
        isNull(revisionEstimates.failure),
      ),
    );
  for (const { id } of stopped) await announceRun(tx, id);
}
