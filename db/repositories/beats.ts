import { eq, sql } from 'drizzle-orm';
import type { Db } from '../client';
import { beats } from '../schema/index';

/** A job was consumed just now, by a worker with this version of the engine. */
export async function beat(db: Db, engineVersion: string): Promise<void> {
  await db.execute(sql`
    insert into beats (name, engine_version, consumed_at) values ('queue', ${engineVersion}, now())
    on conflict (name) do update
      set consumed_at = now(), engine_version = excluded.engine_version`);
}

/** @returns seconds since a job was last consumed, by the database's clock; null if none ever was. */
export async function secondsSinceBeat(db: Db): Promise<number | null> {
  const [row] = await db
    .select({ age: sql<number>`extract(epoch from now() - ${beats.consumedAt})::float8` })
    .from(beats)
    .where(eq(beats.name, 'queue'));
  return row?.age ?? null;
}
