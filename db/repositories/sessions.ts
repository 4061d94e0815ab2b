import { lte, or, sql } from 'drizzle-orm';
import type { Queryable } from '../client';
import { sessions } from '../schema/sessions';

/** Removes sessions past their idle limit or made before `oldest`. @returns how many. */
export async function deleteEndedSessions(db: Queryable, oldest: Date): Promise<number> {
  const rows = await db
    .delete(sessions)
    .where(or(lte(sessions.expiresAt, sql`now()`), lte(sessions.createdAt, oldest)))
    .returning({ id: sessions.id });
  return rows.length;
}
