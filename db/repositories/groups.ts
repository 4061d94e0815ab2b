import { and, asc, eq, inArray } from 'drizzle-orm';
import type { GroupOrigin } from '#contract/enums';
import type { Queryable } from '../client';
import { groups } from '../schema/groups';
import { runs } from '../schema/runs';
import { users } from '../schema/users';
import { ofKeptDataset } from './deletion';
import type { Scope } from './scope';

export interface NewGroup {
  readonly runId: string;
  readonly name: string;
  /** Node ids as in nodes.csv, in row order. */
  readonly nodeIds: readonly string[];
  readonly origin: GroupOrigin;
  readonly note: string;
}

/** @returns the revision that a run reads, or null where the workspace has no such run. */
export async function findRevisionOfRun(
  db: Queryable,
  scope: Scope,
  runId: string,
): Promise<string | null> {
  const rows = await db
    .select({ revisionId: runs.revisionId })
    .from(runs)
    .where(
      and(
        eq(runs.workspaceId, scope.workspaceId),
        eq(runs.id, runId),
        ofKeptDataset(runs.revisionId),
      ),
    );
  return rows[0]?.revisionId ?? null;
}

/** @returns the id of the new group. */
export async function insertGroup(db: Queryable, scope: Scope, group: NewGroup): Promise<string> {
  const { workspaceId, userId } = scope;
  const rows = await db
    .insert(groups)
    .values({ ...group, nodeIds: [...group.nodeIds], workspaceId, createdBy: userId })
    .returning({ id: groups.id });
  const id = rows[0]?.id;
  if (id === undefined) throw new Error('The new group was not returned.');
  return id;
}

/** The groups of a run in the order in which they were saved. */
export async function listGroups(db: Queryable, scope: Scope, runId: string) {
  return db
    .select({
      id: groups.id,
      runId: groups.runId,
      name: groups.name,
      nodeIds: groups.nodeIds,
      origin: groups.origin,
      note: groups.note,
      createdAt: groups.createdAt,
      createdBy: users.name,
    })
    .from(groups)
    .leftJoin(users, eq(users.id, groups.createdBy))
    .where(and(eq(groups.workspaceId, scope.workspaceId), eq(groups.runId, runId)))
    .orderBy(asc(groups.createdAt), asc(groups.id));
}
export type GroupRow = Awaited<ReturnType<typeof listGroups>>[number];

/** @returns false where the workspace has no such group. */
export async function deleteGroup(db: Queryable, scope: Scope, groupId: string): Promise<boolean> {
  const rows = await db
    .delete(groups)
    .where(
      and(
        eq(groups.workspaceId, scope.workspaceId),
        eq(groups.id, groupId),
        inArray(
          groups.runId,
          db
            .select({ id: runs.id })
            .from(runs)
            .where(and(eq(runs.workspaceId, scope.workspaceId), ofKeptDataset(runs.revisionId))),
        ),
      ),
    )
    .returning({ id: groups.id });
  return rows.length === 1;
}
