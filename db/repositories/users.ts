import { eq, sql } from 'drizzle-orm';
import type { Queryable, Transaction } from '../client';
import { users } from '../schema/users';

export type UserRow = typeof users.$inferSelect;
export type NewUser = Pick<typeof users.$inferInsert, 'name' | 'email' | 'passwordHash'>;

/** Key of an address: people do not remember how they wrote its letters. */
export const emailKeyOf = (email: string): string => email.trim().normalize('NFC').toLowerCase();

/** First argument of pg_advisory_xact_lock: held while an account is made. */
const ACCOUNTS_LOCK = 0x4844_4143;

export async function findUserByEmail(db: Queryable, email: string): Promise<UserRow | null> {
  const rows = await db
    .select()
    .from(users)
    .where(eq(users.emailKey, emailKeyOf(email)));
  return rows[0] ?? null;
}

export async function hasUsers(db: Queryable): Promise<boolean> {
  const rows = await db.select({ id: users.id }).from(users).limit(1);
  return rows.length > 0;
}

/** Until the transaction ends nobody else makes an account, so that one account is the first. */
export async function lockAccounts(transaction: Transaction): Promise<void> {
  await transaction.execute(sql`select pg_advisory_xact_lock(${ACCOUNTS_LOCK})`);
}

/** @returns the new row, or null where the address already has an account. */
export async function insertUser(db: Queryable, user: NewUser): Promise<UserRow | null> {
  const rows = await db
    .insert(users)
    .values({ ...user, emailKey: emailKeyOf(user.email) })
    .onConflictDoNothing({ target: users.emailKey })
    .returning();
  return rows[0] ?? null;
}
