import { and, asc, eq, sql } from 'drizzle-orm';
import type { Role } from '#contract/enums';
import type { Queryable, Transaction } from '../client';
import { memberships } from '../schema/memberships';
import { users } from '../schema/users';
import { workspaces } from '../schema/workspaces';
import type { Scope } from './scope';

export interface MemberRow {
  readonly userId: string;
  readonly name: string;
  readonly email: string;
  readonly role: Role;
}

export interface MembershipRow {
  readonly workspaceId: string;
  readonly workspaceName: string;
  readonly role: Role;
}

/** @returns the role as it is now, or null without a membership. */
export async function findRole(
  db: Queryable,
  userId: string,
  workspaceId: string,
): Promise<Role | null> {
  const rows = await db
    .select({ role: memberships.role })
    .from(memberships)
    .where(and(eq(memberships.workspaceId, workspaceId), eq(memberships.userId, userId)));
  return rows[0]?.role ?? null;
}

/** The workspaces of a person, by name. */
export async function listMemberships(db: Queryable, userId: string): Promise<MembershipRow[]> {
  return db
    .select({
      workspaceId: memberships.workspaceId,
      workspaceName: workspaces.name,
      role: memberships.role,
    })
    .from(memberships)
    .innerJoin(workspaces, eq(workspaces.id, memberships.workspaceId))
    .where(eq(memberships.userId, userId))
    .orderBy(asc(workspaces.name), asc(workspaces.createdAt));
}

/** The members of the workspace, by name. */
export async function listMembers(db: Queryable, scope: Scope): Promise<MemberRow[]> {
  return db
    .select({
      userId: memberships.userId,
      name: users.name,
      email: users.email,
      role: memberships.role,
    })
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .where(eq(memberships.workspaceId, scope.workspaceId))
    .orderBy(asc(users.name), asc(users.emailKey));
}

/** @returns false where the person is a member already. */
export async function insertMember(
  db: Queryable,
  scope: Scope,
  userId: string,
  role: Role,
): Promise<boolean> {
  const rows = await db
    .insert(memberships)
    .values({ workspaceId: scope.workspaceId, userId, role })
    .onConflictDoNothing()
    .returning({ userId: memberships.userId });
  return rows.length === 1;
}

/**
 * Until the transaction ends nobody else changes the members of the workspace, so that two owners
 * cannot demote each other at once.
 */
export async function lockMembers(transaction: Transaction, scope: Scope): Promise<void> {
  await transaction.execute(
    sql`select 1 from ${workspaces} where ${workspaces.id} = ${scope.workspaceId} for update`,
  );
}

export async function countOwners(db: Queryable, scope: Scope): Promise<number> {
  return db.$count(
    memberships,
    and(eq(memberships.workspaceId, scope.workspaceId), eq(memberships.role, 'owner')),
  );
}

export async function updateRole(
  db: Queryable,
  scope: Scope,
  userId: string,
  role: Role,
): Promise<void> {
  await db
    .update(memberships)
    .set({ role })
    .where(and(eq(memberships.workspaceId, scope.workspaceId), eq(memberships.userId, userId)));
}

export async function deleteMember(db: Queryable, scope: Scope, userId: string): Promise<void> {
  await db
    .delete(memberships)
    .where(and(eq(memberships.workspaceId, scope.workspaceId), eq(memberships.userId, userId)));
}
