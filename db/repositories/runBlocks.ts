import { and, asc, eq, gt, isNotNull, isNull, sql } from 'drizzle-orm';
import type { Queryable } from '../client';
import { runBlocks } from '../schema/index';
import type { Scope } from './scope';

/** @returns block numbers that landed after the first `after` ones, in the order they landed. */
export async function listLanded(
  db: Queryable,
  scope: Scope,
  runId: string,
  after = 0,
): Promise<number[]> {
  const rows = await db
    .select({ block: runBlocks.block })
    .from(runBlocks)
    .where(
      and(
        eq(runBlocks.workspaceId, scope.workspaceId),
        eq(runBlocks.runId, runId),
        gt(runBlocks.landed, after),
      ),
    )
    .orderBy(asc(runBlocks.landed));
  return rows.map(({ block }) => block);
}

export interface BlockBytes {
  readonly rows: Uint8Array;
  readonly result: Uint8Array;
  readonly pairs: number;
}

/** @returns a stored block, or null while it is not computed or if there is none. */
export async function findBlock(
  db: Queryable,
  scope: Scope,
  runId: string,
  block: number,
): Promise<BlockBytes | null> {
  const [row] = await db
    .select({ rows: runBlocks.rows, result: runBlocks.result, pairs: runBlocks.pairs })
    .from(runBlocks)
    .where(
      and(
        eq(runBlocks.workspaceId, scope.workspaceId),
        eq(runBlocks.runId, runId),
        eq(runBlocks.block, block),
        isNotNull(runBlocks.result),
      ),
    );
  return row?.result ? { ...row, result: row.result } : null;
}

/** @returns which arrival positions each block of the plan computes. */
export async function listBlockRows(
  db: Queryable,
  scope: Scope,
  runId: string,
): Promise<{ readonly block: number; readonly rows: Uint8Array }[]> {
  return db
    .select({ block: runBlocks.block, rows: runBlocks.rows })
    .from(runBlocks)
    .where(and(eq(runBlocks.workspaceId, scope.workspaceId), eq(runBlocks.runId, runId)))
    .orderBy(asc(runBlocks.block));
}

/** Worker side: @returns numbers of the blocks that are planned but not computed, ascending. */
export async function listMissing(db: Queryable, runId: string): Promise<number[]> {
  const rows = await db
    .select({ block: runBlocks.block })
    .from(runBlocks)
    .where(and(eq(runBlocks.runId, runId), isNull(runBlocks.result)))
    .orderBy(asc(runBlocks.block));
  return rows.map(({ block }) => block);
}

/** Worker side: @returns the rows to compute, or null if the block is stored or does not exist. */
export async function findMissingRows(
  db: Queryable,
  runId: string,
  block: number,
): Promise<Uint8Array | null> {
  const [row] = await db
    .select({ rows: runBlocks.rows })
    .from(runBlocks)
    .where(and(eq(runBlocks.runId, runId), eq(runBlocks.block, block), isNull(runBlocks.result)));
  return row?.rows ?? null;
}

export interface PlannedBlock {
  readonly pairs: number;
  /** Stored u32 array of arrival positions. */
  readonly rows: Uint8Array;
}

const BATCH = 500;

/** Worker side, within the transaction of the plan: writes the blocks 0, 1, … */
export async function insertPlan(
  db: Queryable,
  workspaceId: string,
  runId: string,
  blocks: readonly PlannedBlock[],
): Promise<void> {
  for (let start = 0; start < blocks.length; start += BATCH) {
    await db
      .insert(runBlocks)
      .values(
        blocks
          .slice(start, start + BATCH)
          .map(({ pairs, rows }, k) => ({ workspaceId, runId, block: start + k, pairs, rows })),
      );
  }
}

/**
 * Worker side, within a transaction that holds the run's row: stores a result once.
 *
 * @returns the pairs of the block, or null if its result was there already
 */
export async function fillBlock(
  db: Queryable,
  runId: string,
  filled: {
    readonly block: number;
    readonly result: Uint8Array;
    readonly landed: number;
    readonly attempt: number;
  },
): Promise<number | null> {
  const { block, result, landed, attempt } = filled;
  const [row] = await db
    .update(runBlocks)
    .set({ result, landed, attempt, finishedAt: sql`now()` })
    .where(and(eq(runBlocks.runId, runId), eq(runBlocks.block, block), isNull(runBlocks.result)))
    .returning({ pairs: runBlocks.pairs });
  return row?.pairs ?? null;
}
