import type { SignInRequest, SignUpRequest } from '#contract/accounts';
import type { Db } from '../../db/client';
import {
  findUserByEmail,
  hasUsers,
  insertUser,
  lockAccounts,
  type UserRow,
} from '../../db/repositories/users';
import { insertOwnedWorkspace } from '../../db/repositories/workspaces';
import { weakness } from '../auth/passwordRules';
import type { Passwords } from '../auth/passwords';
import { emailTaken, weakPassword, wrongCredentials } from './errors';

const FIRST_WORKSPACE = 'First workspace';

/**
 * Makes an account. The very first of an instance also makes a workspace and owns it; accounts are
 * made one at a time, so exactly one is the first.
 */
export async function signUp(
  db: Db,
  passwords: Passwords,
  request: SignUpRequest,
): Promise<UserRow> {
  const weak = weakness(request.password, request);
  if (weak !== null) throw weakPassword(weak);
  const passwordHash = await passwords.hash(request.password);
  return db.transaction(async (transaction) => {
    await lockAccounts(transaction);
    const first = !(await hasUsers(transaction));
    const { name, email } = request;
    const user = await insertUser(transaction, { name, email, passwordHash });
    if (user === null) throw emailTaken();
    if (first) {
      await insertOwnedWorkspace(transaction, request.workspaceName || FIRST_WORKSPACE, user.id);
    }
    return user;
  });
}

/** @throws Failure `session.wrong_credentials`, the same for unknown addresses and wrong passwords */
export async function checkCredentials(
  db: Db,
  passwords: Passwords,
  request: SignInRequest,
): Promise<UserRow> {
  const user = await findUserByEmail(db, request.email);
  const right = await passwords.verify(user?.passwordHash ?? null, request.password);
  if (user === null || !right) throw wrongCredentials();
  return user;
}
