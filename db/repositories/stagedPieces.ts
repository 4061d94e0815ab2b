import { randomUUID } from 'node:crypto';
import { eq, sql, type SQL } from 'drizzle-orm';
import type { Queryable } from '../client';
import { stagedPieces } from '../schema/stagedPieces';

/**
 * A typed array as bytes of db/codecs that come piece by piece, so that a process need not hold
 * all of them; what travels in one message is copied several times on its way.
 */
export interface EncodedPieces {
  /** Names the bytes while they are on their way; each object has its own. */
  readonly stage: string;
  /** Elements of the array. */
  readonly length: number;
  /** Pieces of at most 1 MiB. */
  readonly pieces: () => AsyncIterable<Uint8Array>;
}

export const encodedPieces = (
  length: number,
  pieces: () => AsyncIterable<Uint8Array>,
): EncodedPieces => ({ stage: randomUUID(), length, pieces });

/**
 * Sends the pieces ahead; give a transaction.
 * @returns the whole, as a value for a bytea column
 */
export async function staged(db: Queryable, { stage, pieces }: EncodedPieces): Promise<SQL> {
  let piece = 0;
  for await (const content of pieces()) {
    await db.insert(stagedPieces).values({ stage, piece: piece++, content });
  }
  return sql`(select coalesce(string_agg(content, ''::bytea order by piece), ''::bytea)
    from staged_pieces where stage = ${stage})`;
}

/** Removes what was sent ahead once it is where it belongs. */
export async function removeStaged(db: Queryable, { stage }: EncodedPieces): Promise<void> {
  await db.delete(stagedPieces).where(eq(stagedPieces.stage, stage));
}
