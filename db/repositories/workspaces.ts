import { and, eq } from 'drizzle-orm';
import type { Queryable } from '../client';
import { memberships } from '../schema/memberships';
import { workspaces } from '../schema/workspaces';
import type { Scope } from './scope';

export type WorkspaceRow = typeof workspaces.$inferSelect;

/** Makes a workspace that the person owns; give a transaction, so that it never lacks an owner. */
export async function insertOwnedWorkspace(
  db: Queryable,
  name: string,
  ownerId: string,
): Promise<WorkspaceRow> {
  const rows = await db.insert(workspaces).values({ name }).returning();
  const row = rows[0];
  if (row === undefined) throw new Error('The new workspace was not returned.');
  await db.insert(memberships).values({ workspaceId: row.id, userId: ownerId, role: 'owner' });
  return row;
}

/** @returns the workspace if the person is a member of it, else null. */
export async function findWorkspace(db: Queryable, scope: Scope): Promise<WorkspaceRow | null> {
  const rows = await db
    .select({ id: workspaces.id, name: workspaces.name, createdAt: workspaces.createdAt })
    .from(workspaces)
    .innerJoin(memberships, eq(memberships.workspaceId, workspaces.id))
    .where(and(eq(workspaces.id, scope.workspaceId), eq(memberships.userId, scope.userId)));
  return rows[0] ?? null;
}
