import { and, asc, desc, eq, inArray, isNull } from 'drizzle-orm';
import type { Queryable, Transaction } from '../client';
import { datasets } from '../schema/datasets';
import { revisions } from '../schema/revisions';
import { runs } from '../schema/runs';
import type { Scope } from './scope';

export type DatasetRow = typeof datasets.$inferSelect;

export interface NewDataset {
  readonly name: string;
  readonly description: string;
  /** Demo data; false unless told otherwise. */
  readonly invented?: boolean;
}

export async function insertDataset(
  db: Queryable,
  scope: Scope,
  dataset: NewDataset,
): Promise<DatasetRow> {
  const { workspaceId, userId } = scope;
  const rows = await db
    .insert(datasets)
    .values({ ...dataset, workspaceId, createdBy: userId })
    .returning();
  const row = rows[0];
  if (row === undefined) throw new Error('The new dataset was not returned.');
  return row;
}

/** The datasets of the workspace that are not deleted, newest first. */
export async function listDatasets(
  db: Queryable,
  scope: Scope,
  archived: 'hidden' | 'shown',
): Promise<DatasetRow[]> {
  return db
    .select()
    .from(datasets)
    .where(
      and(
        eq(datasets.workspaceId, scope.workspaceId),
        isNull(datasets.deletedAt),
        archived === 'hidden' ? isNull(datasets.archivedAt) : undefined,
      ),
    )
    .orderBy(desc(datasets.createdAt), asc(datasets.id));
}

export async function findDataset(
  db: Queryable,
  scope: Scope,
  datasetId: string,
): Promise<DatasetRow | null> {
  const rows = await db.select().from(datasets).where(isDataset(scope, datasetId));
  return rows[0] ?? null;
}

/** Until the transaction ends nobody else adds a revision to the dataset. @returns null if missing */
export async function lockDataset(
  transaction: Transaction,
  scope: Scope,
  datasetId: string,
): Promise<DatasetRow | null> {
  const rows = await transaction
    .select()
    .from(datasets)
    .where(isDataset(scope, datasetId))
    .for('update');
  return rows[0] ?? null;
}

/** The runs of these datasets, newest first, without their results. */
export async function listRunBriefs(db: Queryable, scope: Scope, datasetIds: readonly string[]) {
  if (datasetIds.length === 0) return [];
  return db
    .select({
      id: runs.id,
      datasetId: revisions.datasetId,
      number: runs.number,
      revisionNumber: revisions.number,
      scale: runs.scale,
      dimensions: runs.dimensions,
      part: runs.part,
      state: runs.state,
      createdAt: runs.createdAt,
    })
    .from(runs)
    .innerJoin(
      revisions,
      and(eq(revisions.workspaceId, runs.workspaceId), eq(revisions.id, runs.revisionId)),
    )
    .where(
      and(eq(runs.workspaceId, scope.workspaceId), inArray(revisions.datasetId, [...datasetIds])),
    )
    .orderBy(desc(runs.number));
}
export type RunBriefRow = Awaited<ReturnType<typeof listRunBriefs>>[number];

function isDataset(scope: Scope, datasetId: string) {
  return and(
    eq(datasets.workspaceId, scope.workspaceId),
    eq(datasets.id, datasetId),
    isNull(datasets.deletedAt),
  );
}
