import { eq, sql } from 'drizzle-orm';
import type { Db } from '../client';
import { beats } from '../schema/index';

/** A job was consumed just now. */
export async function beat(db: Db): Promise<void> {
  await db.execute(sql`
    insert into beats (name, consumed_at) values ('queue', now())
    on conflict (name) do update set consumed_at = now()`);
}

/** @returns when a job was last consumed, or null if none ever was. */
export async function lastBeat(db: Db): Promise<Date | null> {
  const [row] = await db
    .select({ consumedAt: beats.consumedAt })
    .from(beats)
    .where(eq(beats.name, 'queue'));
  return row?.consumedAt ?? null;
}
