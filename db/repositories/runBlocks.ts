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

/** The stored pairs of a block (db/codecs/blockPairs). */
export interface PairBytes {
  readonly rows: Uint8Array;
  readonly partners: Uint8Array | null;
}

export interface BlockBytes extends PairBytes {
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
    .select({
      rows: runBlocks.rows,
      partners: runBlocks.partners,
      result: runBlocks.result,
      pairs: runBlocks.pairs,
    })
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

/** @returns which pairs each block of the plan computes. */
export async function listBlockRows(
  db: Queryable,
  scope: Scope,
  runId: string,
): Promise<(PairBytes & { readonly block: number; readonly pairs: number })[]> {
  return db
    .select({
      block: runBlocks.block,
      rows: runBlocks.rows,
      partners: runBlocks.partners,
      pairs: runBlocks.pairs,
    })
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

/** Worker side: @returns the pairs of every block that is planned but not computed, ascending. */
export async function listMissingPairs(
  db: Queryable,
  runId: string,
): Promise<(PairBytes & { readonly block: number; readonly pairs: number })[]> {
  return db
    .select({
      block: runBlocks.block,
      rows: runBlocks.rows,
      partners: runBlocks.partners,
      pairs: runBlocks.pairs,
    })
    .from(runBlocks)
    .where(and(eq(runBlocks.runId, runId), isNull(runBlocks.result)))
    .orderBy(asc(runBlocks.block));
}

/** Worker side: @returns the pairs to compute, or null if the block is stored or does not exist. */
export async function findMissingPairs(
  db: Queryable,
  runId: string,
  block: number,
): Promise<PairBytes | null> {
  const [row] = await db
    .select({ rows: runBlocks.rows, partners: runBlocks.partners })
    .from(runBlocks)
    .where(and(eq(runBlocks.runId, runId), eq(runBlocks.block, block), isNull(runBlocks.result)));
  return row ?? null;
}

export interface PlannedBlock extends PairBytes {
  readonly pairs: number;
  /** Estimate of one thread's seconds. */
  readonly cost: number;
}

const BATCH = 500;

/** Worker side, within the transaction of the plan: writes the blocks first, first + 1, … */
export async function insertPlan(
  db: Queryable,
  { workspaceId, runId, first }: { workspaceId: string; runId: string; first: number },
  blocks: readonly PlannedBlock[],
): Promise<void> {
  for (let start = 0; start < blocks.length; start += BATCH) {
    await db.insert(runBlocks).values(
      blocks.slice(start, start + BATCH).map((planned, k) => ({
        ...planned,
        workspaceId,
        runId,
        block: first + start + k,
      })),
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
    readonly storedBy: string;
  },
): Promise<number | null> {
  const { block, ...stored } = filled;
  const [row] = await db
    .update(runBlocks)
    .set({ ...stored, finishedAt: sql`now()` })
    .where(and(eq(runBlocks.runId, runId), eq(runBlocks.block, block), isNull(runBlocks.result)))
    .returning({ pairs: runBlocks.pairs });
  return row?.pairs ?? null;
}
