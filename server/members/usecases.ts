import type { Role } from '#contract/enums';
import type { AddMemberRequest } from '#contract/workspaces';
import type { Db, Transaction } from '../../db/client';
import {
  countOwners,
  deleteMember,
  findRole,
  insertMember,
  lockMembers,
  updateRole,
  type MemberRow,
} from '../../db/repositories/memberships';
import { findUserByEmail } from '../../db/repositories/users';
import type { Scope } from '../../db/repositories/scope';
import { notFound } from '../http/parse';
import { alreadyMember, lastOwner, noLongerOwner, noSuchAccount } from './errors';

/** Adds a person who has an account on this instance. */
export async function addMember(
  db: Db,
  scope: Scope,
  request: AddMemberRequest,
): Promise<MemberRow> {
  const user = await findUserByEmail(db, request.email);
  if (user === null) throw noSuchAccount();
  if (!(await insertMember(db, scope, user.id, request.role))) throw alreadyMember();
  return { userId: user.id, name: user.name, email: user.email, role: request.role };
}

/** @throws Failure `members.last_owner` where nobody would own the workspace afterwards */
export async function changeRole(db: Db, scope: Scope, userId: string, role: Role): Promise<void> {
  await db.transaction(async (transaction) => {
    const before = await roleUnderLock(transaction, scope, userId);
    if (before === 'owner' && role !== 'owner') await requireOtherOwner(transaction, scope);
    await updateRole(transaction, scope, userId, role);
  });
}

/** @throws Failure `members.last_owner` where nobody would own the workspace afterwards */
export async function removeMember(db: Db, scope: Scope, userId: string): Promise<void> {
  await db.transaction(async (transaction) => {
    const before = await roleUnderLock(transaction, scope, userId);
    if (before === 'owner') await requireOtherOwner(transaction, scope);
    await deleteMember(transaction, scope, userId);
  });
}

/**
 * The member's role once nobody else can change it. The person's own role is read again: between the
 * start of the request and the lock somebody may have taken it away.
 */
async function roleUnderLock(
  transaction: Transaction,
  scope: Scope,
  userId: string,
): Promise<Role> {
  await lockMembers(transaction, scope);
  const own = await findRole(transaction, scope.userId, scope.workspaceId);
  if (own === null) throw notFound('workspaces');
  if (own !== 'owner') throw noLongerOwner();
  const role = await findRole(transaction, userId, scope.workspaceId);
  if (role === null) throw notFound('members');
  return role;
}

async function requireOtherOwner(transaction: Transaction, scope: Scope): Promise<void> {
  if ((await countOwners(transaction, scope)) < 2) throw lastOwner();
}
