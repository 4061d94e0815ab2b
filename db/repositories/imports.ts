import { and, asc, desc, eq, gt, isNull, lt, or, sql } from 'drizzle-orm';
import type { Queryable, Transaction } from '../client';
import { datasets } from '../schema/datasets';
import { importFiles, imports } from '../schema/imports';
import { users } from '../schema/users';
import type { Scope } from './scope';

/** Open drafts are kept so long after their last change. */
const KEPT = sql`now() + interval '30 days'`;

export interface NewImport {
  readonly name: string;
  /** The dataset that is to get a revision; null for a new one. */
  readonly datasetId: string | null;
}

/** @returns the id of the new draft */
export async function insertImport(
  db: Queryable,
  { workspaceId, userId }: Scope,
  draft: NewImport,
): Promise<string> {
  const [row] = await db
    .insert(imports)
    .values({ ...draft, workspaceId, createdBy: userId, expiresAt: KEPT })
    .returning({ id: imports.id });
  if (row === undefined) throw new Error('The new import was not returned.');
  return row.id;
}

const head = {
  id: imports.id,
  name: imports.name,
  state: imports.state,
  datasetId: imports.datasetId,
  datasetName: datasets.name,
  createdAt: imports.createdAt,
  createdBy: users.name,
  updatedAt: imports.updatedAt,
  expiresAt: imports.expiresAt,
};

/** The open drafts of the workspace, last changed first. */
export async function listImports(db: Queryable, scope: Scope) {
  return db
    .select(head)
    .from(imports)
    .leftJoin(datasets, ofDataset)
    .leftJoin(users, eq(users.id, imports.createdBy))
    .where(and(eq(imports.workspaceId, scope.workspaceId), isOpen()))
    .orderBy(desc(imports.updatedAt), asc(imports.id));
}
export type ImportHead = Awaited<ReturnType<typeof listImports>>[number];

/** @returns how many open drafts the workspace has, and the bytes of their files */
export async function countImports(
  db: Queryable,
  scope: Scope,
): Promise<{ readonly drafts: number; readonly bytes: number }> {
  const [row] = await db
    .select({
      drafts: sql<number>`count(distinct ${imports.id})::int`,
      bytes: sql<number>`coalesce(sum(${importFiles.bytes}), 0)::float8`,
    })
    .from(imports)
    .leftJoin(
      importFiles,
      and(eq(importFiles.workspaceId, imports.workspaceId), eq(importFiles.importId, imports.id)),
    )
    .where(and(eq(imports.workspaceId, scope.workspaceId), isOpen()));
  return row ?? { drafts: 0, bytes: 0 };
}

/** A draft that has not expired, or a saved import, with what was last read of it; or null. */
export async function findImport(db: Queryable, scope: Scope, importId: string) {
  const [row] = await db
    .select({
      ...head,
      revisionId: imports.revisionId,
      version: imports.version,
      choices: imports.choices,
      readVersion: imports.readVersion,
      view: imports.view,
      weights: imports.weights,
    })
    .from(imports)
    .leftJoin(datasets, ofDataset)
    .leftJoin(users, eq(users.id, imports.createdBy))
    .where(and(isImport(scope, importId), or(eq(imports.state, 'saved'), isOpen())));
  return row ?? null;
}
export type ImportRow = NonNullable<Awaited<ReturnType<typeof findImport>>>;

export interface ImportChange {
  readonly name?: string;
  /** Null for what is guessed; absent to leave them. */
  readonly choices?: object | null;
  /** Whether hints change in this transaction: what was read is void then, as with choices. */
  readonly rereads: boolean;
}

/** Changes an open draft and keeps it for another while. @returns false where there is none */
export async function changeImport(
  db: Queryable,
  scope: Scope,
  importId: string,
  { rereads, ...set }: ImportChange,
): Promise<boolean> {
  const rows = await db
    .update(imports)
    .set({
      ...set,
      ...(rereads ? { version: sql`${imports.version} + 1` } : {}),
      updatedAt: sql`now()`,
      expiresAt: KEPT,
    })
    .where(and(isImport(scope, importId), isOpen()))
    .returning({ id: imports.id });
  return rows.length === 1;
}

export interface ImportReading {
  readonly version: number;
  readonly view: object;
  readonly weights: object | null;
}

/** Stores what was read of a version. @returns false where the draft has changed or gone meanwhile */
export async function storeReading(
  db: Queryable,
  scope: Scope,
  importId: string,
  { version, view, weights }: ImportReading,
): Promise<boolean> {
  const rows = await db
    .update(imports)
    .set({ view, weights, readVersion: version })
    .where(and(isImport(scope, importId), isOpen(), eq(imports.version, version)))
    .returning({ id: imports.id });
  return rows.length === 1;
}

/** Until the transaction ends nobody else changes or saves the import. @returns null if missing */
export async function lockImport(transaction: Transaction, scope: Scope, importId: string) {
  const [row] = await transaction
    .select({
      state: imports.state,
      version: imports.version,
      datasetId: imports.datasetId,
      revisionId: imports.revisionId,
    })
    .from(imports)
    .where(isImport(scope, importId))
    .for('update');
  return row ?? null;
}

/** What came of a draft. */
export async function markSaved(
  db: Queryable,
  scope: Scope,
  importId: string,
  saved: { readonly datasetId: string; readonly revisionId: string },
): Promise<void> {
  await db
    .update(imports)
    .set({ ...saved, state: 'saved', updatedAt: sql`now()` })
    .where(isImport(scope, importId));
}

/** Removes an open draft with its files. @returns false where there is none */
export async function deleteImport(
  db: Queryable,
  scope: Scope,
  importId: string,
): Promise<boolean> {
  const rows = await db
    .delete(imports)
    .where(and(isImport(scope, importId), isOpen()))
    .returning({ id: imports.id });
  return rows.length === 1;
}

/** Removes the drafts that nobody came back to, in every workspace. @returns how many */
export async function deleteExpiredImports(db: Queryable): Promise<number> {
  const rows = await db
    .delete(imports)
    .where(and(eq(imports.state, 'open'), lt(imports.expiresAt, sql`now()`)))
    .returning({ id: imports.id });
  return rows.length;
}

const isOpen = () => and(eq(imports.state, 'open'), gt(imports.expiresAt, sql`now()`));

const isImport = (scope: Scope, importId: string) =>
  and(eq(imports.workspaceId, scope.workspaceId), eq(imports.id, importId));

const ofDataset = and(
  eq(datasets.workspaceId, imports.workspaceId),
  eq(datasets.id, imports.datasetId),
  isNull(datasets.deletedAt),
);
