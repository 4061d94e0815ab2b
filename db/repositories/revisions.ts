import { and, asc, desc, eq, inArray, sql } from 'drizzle-orm';
import type { EntryUnit } from '#contract/enums';
import type { Queryable } from '../client';
import { encodeFloat64, encodeUint32 } from '../codecs/typedArrays';
import { datasets } from '../schema/datasets';
import { revisionNodes } from '../schema/revisionNodes';
import { revisions } from '../schema/revisions';
import { users } from '../schema/users';
import { ofKeptDataset } from './deletion';
import type { Scope } from './scope';
import { removeStaged, staged, type EncodedPieces } from './stagedPieces';

export interface NewNode {
  readonly id: string;
  readonly label: string;
  readonly entryRaw: string;
  readonly entry: number;
  readonly earliestRaw: string;
  readonly earliest: number | null;
  readonly latestRaw: string;
  readonly latest: number | null;
}

export interface NewRevision {
  readonly datasetId: string;
  readonly number: number;
  readonly contentHash: string;
  readonly entryUnit: EntryUnit;
  readonly nodes: readonly NewNode[];
  /** u32[2 m]: node rows of the ends of each edge, lower row first, edges ascending. */
  readonly edges: Uint32Array | EncodedPieces;
  /** f64[m]: the weight of each edge, NaN for none; null or absent where the network has none. */
  readonly weights?: Float64Array | EncodedPieces | null;
  /** Contract: importReport. */
  readonly report: object;
}

const summary = {
  id: revisions.id,
  datasetId: revisions.datasetId,
  number: revisions.number,
  contentHash: revisions.contentHash,
  nodeCount: revisions.nodeCount,
  edgeCount: revisions.edgeCount,
  entryUnit: revisions.entryUnit,
  report: revisions.report,
  createdAt: revisions.createdAt,
  createdBy: users.name,
};

/** Writes a revision with its nodes; give a transaction. @returns its id */
export async function insertRevision(
  db: Queryable,
  scope: Scope,
  revision: NewRevision,
): Promise<string> {
  const { nodes, edges, weights, ...columns } = revision;
  const edgeBytes = edges instanceof Uint32Array ? encodeUint32(edges) : await staged(db, edges);
  const rows = await db
    .insert(revisions)
    .values({
      ...columns,
      workspaceId: scope.workspaceId,
      createdBy: scope.userId,
      nodeCount: nodes.length,
      edgeCount: edges.length / 2,
      edges: edgeBytes,
      weights: weights && (await weightBytes(db, weights)),
    })
    .returning({ id: revisions.id });
  const id = rows[0]?.id;
  if (id === undefined) throw new Error('The new revision was not returned.');
  for (const array of [edges, weights]) {
    if (array && 'stage' in array) await removeStaged(db, array);
  }
  await insertNodes(db, scope, id, nodes);
  return id;
}

const weightBytes = (db: Queryable, weights: Float64Array | EncodedPieces) =>
  weights instanceof Float64Array ? encodeFloat64(weights) : staged(db, weights);

/** One statement whatever the number of nodes: each column travels as one array. */
async function insertNodes(
  db: Queryable,
  scope: Scope,
  revisionId: string,
  nodes: readonly NewNode[],
): Promise<void> {
  const column = <K extends keyof NewNode>(key: K) => sql.param(nodes.map((node) => node[key]));
  await db.execute(sql`
    insert into revision_nodes (workspace_id, revision_id, row, node_id, label,
      entry_raw, entry, earliest_raw, earliest, latest_raw, latest)
    select ${scope.workspaceId}::uuid, ${revisionId}::uuid, n - 1, node_id, label,
      entry_raw, entry, earliest_raw, earliest, latest_raw, latest
    from unnest(${column('id')}::text[], ${column('label')}::text[],
      ${column('entryRaw')}::text[], ${column('entry')}::float8[],
      ${column('earliestRaw')}::text[], ${column('earliest')}::float8[],
      ${column('latestRaw')}::text[], ${column('latest')}::float8[])
      with ordinality
      as t (node_id, label, entry_raw, entry, earliest_raw, earliest, latest_raw, latest, n)`);
}

/** The revisions of these datasets without nodes and edges, newest first. */
export async function listRevisions(db: Queryable, scope: Scope, datasetIds: readonly string[]) {
  if (datasetIds.length === 0) return [];
  return db
    .select(summary)
    .from(revisions)
    .leftJoin(users, eq(users.id, revisions.createdBy))
    .where(
      and(
        eq(revisions.workspaceId, scope.workspaceId),
        inArray(revisions.datasetId, [...datasetIds]),
      ),
    )
    .orderBy(desc(revisions.number));
}
export type RevisionSummaryRow = Awaited<ReturnType<typeof listRevisions>>[number];

/** Number and content hash of the newest revision of a dataset, or null. */
export async function findLatestRevision(db: Queryable, scope: Scope, datasetId: string) {
  const rows = await db
    .select({ number: revisions.number, contentHash: revisions.contentHash })
    .from(revisions)
    .where(and(eq(revisions.workspaceId, scope.workspaceId), eq(revisions.datasetId, datasetId)))
    .orderBy(desc(revisions.number))
    .limit(1);
  return rows[0] ?? null;
}

/** A revision with its edges and the name of its dataset, or null. */
export async function findRevision(db: Queryable, scope: Scope, revisionId: string) {
  const rows = await db
    .select({
      ...summary,
      edges: revisions.edges,
      datasetName: datasets.name,
      invented: datasets.invented,
    })
    .from(revisions)
    .innerJoin(
      datasets,
      and(eq(datasets.workspaceId, revisions.workspaceId), eq(datasets.id, revisions.datasetId)),
    )
    .leftJoin(users, eq(users.id, revisions.createdBy))
    .where(isRevision(scope, revisionId));
  return rows[0] ?? null;
}
export type RevisionRow = NonNullable<Awaited<ReturnType<typeof findRevision>>>;

/** The nodes of a revision in the order of the uploaded file. */
export async function listNodes(db: Queryable, scope: Scope, revisionId: string) {
  return db
    .select({
      row: revisionNodes.row,
      nodeId: revisionNodes.nodeId,
      label: revisionNodes.label,
      entryRaw: revisionNodes.entryRaw,
      entry: revisionNodes.entry,
      earliestRaw: revisionNodes.earliestRaw,
      earliest: revisionNodes.earliest,
      latestRaw: revisionNodes.latestRaw,
      latest: revisionNodes.latest,
    })
    .from(revisionNodes)
    .where(
      and(
        eq(revisionNodes.workspaceId, scope.workspaceId),
        eq(revisionNodes.revisionId, revisionId),
      ),
    )
    .orderBy(asc(revisionNodes.row));
}
export type NodeRow = Awaited<ReturnType<typeof listNodes>>[number];

function isRevision(scope: Scope, revisionId: string) {
  return and(
    eq(revisions.workspaceId, scope.workspaceId),
    eq(revisions.id, revisionId),
    ofKeptDataset(revisions.id),
  );
}

/** @returns its number within the dataset, or null if the workspace has no such revision. */
export async function findRevisionNumber(
  db: Queryable,
  scope: Scope,
  revisionId: string,
): Promise<number | null> {
  const [row] = await db
    .select({ number: revisions.number })
    .from(revisions)
    .where(isRevision(scope, revisionId));
  return row?.number ?? null;
}

/** @returns how many nodes the revision has, or null if the workspace has no such revision. */
export async function findRevisionSize(
  db: Queryable,
  scope: Scope,
  revisionId: string,
): Promise<number | null> {
  const [row] = await db
    .select({ nodeCount: revisions.nodeCount })
    .from(revisions)
    .where(isRevision(scope, revisionId));
  return row?.nodeCount ?? null;
}
