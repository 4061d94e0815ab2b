import { and, eq, getTableColumns, inArray, sql } from 'drizzle-orm';
import type { Db, Transaction } from '../client';
import { datasets, revisionNodes, revisions, runs, users } from '../schema/index';
import { createMail, type NewMail } from './mails';
import { addToOutbox } from './outbox';
import { fillBlock, insertPlan, type PlannedBlock } from './runBlocks';
import { announceRun, type RunRow } from './runs';

/** Every write of a worker names the run and the attempt it works for; a later attempt fences it out. */
export interface Fence {
  readonly runId: string;
  readonly attempt: number;
}

/** What a worker must know of a run. */
export type WorkRun = Pick<
  RunRow,
  | 'id'
  | 'workspaceId'
  | 'revisionId'
  | 'scale'
  | 'dimensions'
  | 'engineVersion'
  | 'attempt'
  | 'blockCount'
  | 'dispatchId'
  | 'part'
  | 'extendedFrom'
  | 'blocksBefore'
  | 'secondsSpent'
> & { readonly nodeCount: number };

/** When a message about the end of a run is due, and what it says. */
export interface MailRule {
  readonly afterSeconds: number;
  compose(ended: EndedRun): Omit<NewMail, 'recipient'>;
}

export interface EndedRun {
  readonly id: string;
  readonly workspaceId: string;
  readonly number: number;
  readonly datasetName: string;
  readonly recipientName: string;
  readonly state: 'done' | 'failed';
  readonly failureMessage: string | null;
  readonly seconds: number;
}

const UNFINISHED = ['queued', 'running'] as const;

const fenced = (fence: Fence) => and(eq(runs.id, fence.runId), eq(runs.attempt, fence.attempt));

/** Takes the run for this attempt. @returns null if it is finished, gone, or at a later attempt. */
export async function claimRun(db: Db, fence: Fence): Promise<WorkRun | null> {
  const [row] = await db
    .update(runs)
    .set({
      state: 'running',
      startedAt: sql`coalesce(${runs.startedAt}, now())`,
      heartbeatAt: sql`now()`,
    })
    .where(and(fenced(fence), inArray(runs.state, UNFINISHED)))
    .returning();
  return row ? describe(db, row.id) : null;
}

/** Reads a run in any state, for answering questions about single swaps. */
export async function describe(db: Db, runId: string): Promise<WorkRun | null> {
  const { id, workspaceId, revisionId, scale, dimensions, engineVersion } = getTableColumns(runs);
  const { attempt, blockCount, dispatchId, part, extendedFrom } = getTableColumns(runs);
  const { blocksBefore, secondsSpent } = getTableColumns(runs);
  const [row] = await db
    .select({
      id,
      workspaceId,
      revisionId,
      scale,
      dimensions,
      engineVersion,
      attempt,
      blockCount,
      dispatchId,
      part,
      extendedFrom,
      blocksBefore,
      secondsSpent,
      nodeCount: revisions.nodeCount,
    })
    .from(runs)
    .innerJoin(revisions, eq(revisions.id, runs.revisionId))
    .where(eq(runs.id, runId));
  return row ?? null;
}

export interface StoredNetwork {
  /** Stored u32 array of node rows. */
  readonly edges: Uint8Array;
  /** Recorded entries in row order. */
  readonly entries: Float64Array;
}

/** @returns the network of a revision; null if it is gone. */
export async function readNetwork(
  db: Db,
  workspaceId: string,
  revisionId: string,
): Promise<StoredNetwork | null> {
  const [revision] = await db
    .select({ edges: revisions.edges })
    .from(revisions)
    .where(and(eq(revisions.workspaceId, workspaceId), eq(revisions.id, revisionId)));
  if (!revision) return null;
  const nodes = await db
    .select({ entry: revisionNodes.entry })
    .from(revisionNodes)
    .where(
      and(eq(revisionNodes.workspaceId, workspaceId), eq(revisionNodes.revisionId, revisionId)),
    )
    .orderBy(revisionNodes.row);
  return { edges: revision.edges, entries: Float64Array.from(nodes, ({ entry }) => entry) };
}

export interface Plan {
  readonly engineVersion: string;
  readonly estimate: unknown;
  readonly barcode: Uint8Array;
  readonly blocks: readonly PlannedBlock[];
}

/**
 * Stores the plan once and asks for its blocks; that of an extension adds blocks after those that
 * are stored. @returns whether this call stored it.
 */
export async function storePlan(
  db: Db,
  fence: Fence,
  plan: Plan,
  mail: MailRule,
): Promise<boolean> {
  return db.transaction(async (tx) => {
    const pairs = plan.blocks.reduce((sum, block) => sum + block.pairs, 0);
    const [run] = await tx
      .update(runs)
      .set({
        engineVersion: plan.engineVersion,
        estimate: plan.estimate,
        barcode: plan.barcode,
        blockCount: sql`${runs.blocksBefore} + ${plan.blocks.length}`,
        pairsTotal: sql`${runs.pairsBefore} + ${pairs}`,
        heartbeatAt: sql`now()`,
      })
      .where(and(fenced(fence), eq(runs.state, 'running'), sql`${runs.blockCount} is null`))
      .returning();
    if (!run) return false;
    const { workspaceId, blocksBefore: first } = run;
    await insertPlan(tx, { workspaceId, runId: fence.runId, first }, plan.blocks);
    if (plan.blocks.length === 0) {
      await endRun(tx, fence, { state: 'done', failure: null }, mail);
    } else {
      await addToOutbox(
        tx,
        run.workspaceId,
        { kind: 'blocks', payload: { ...fence } },
        run.dispatchId,
      );
    }
    await announceRun(tx, fence.runId);
    return true;
  });
}

export interface ComputedBlock {
  readonly block: number;
  readonly result: Uint8Array;
  /** Names the worker process. */
  readonly storedBy: string;
  /** What a thread spent on it. */
  readonly seconds: number;
}

/**
 * Stores the result of a block once; the last block ends the run in the same transaction.
 *
 * @returns `stale` if nothing was written: another worker stored it, or the attempt is over
 */
export async function storeBlock(
  db: Db,
  fence: Fence,
  { seconds, ...computed }: ComputedBlock,
  mail: MailRule,
): Promise<'stored' | 'last' | 'stale'> {
  return db.transaction(async (tx) => {
    const [run] = await tx
      .select({ blocksDone: runs.blocksDone, blockCount: runs.blockCount })
      .from(runs)
      .where(and(fenced(fence), eq(runs.state, 'running')))
      .for('no key update');
    if (!run) return 'stale';
    const landed = run.blocksDone + 1;
    const { attempt } = fence;
    const pairs = await fillBlock(tx, fence.runId, { ...computed, landed, attempt });
    if (pairs === null) return 'stale';
    await tx
      .update(runs)
      .set({
        blocksDone: landed,
        pairsDone: sql`${runs.pairsDone} + ${pairs}`,
        secondsSpent: sql`${runs.secondsSpent} + ${seconds}`,
        heartbeatAt: sql`now()`,
      })
      .where(fenced(fence));
    const last = landed === run.blockCount;
    if (last) await endRun(tx, fence, { state: 'done', failure: null }, mail);
    await announceRun(tx, fence.runId);
    return last ? 'last' : 'stored';
  });
}

/** Ends a run whose blocks are all stored, should that have been left undone. */
export async function finishIfComplete(db: Db, fence: Fence, mail: MailRule): Promise<boolean> {
  return db.transaction(async (tx) => {
    const [run] = await tx
      .select({ blocksDone: runs.blocksDone, blockCount: runs.blockCount })
      .from(runs)
      .where(and(fenced(fence), eq(runs.state, 'running')))
      .for('no key update');
    if (!run || run.blockCount === null || run.blocksDone < run.blockCount) return false;
    await endRun(tx, fence, { state: 'done', failure: null }, mail);
    await announceRun(tx, fence.runId);
    return true;
  });
}

export interface RunFailure {
  readonly code: string;
  /** A plain sentence with the number that broke a limit. */
  readonly message: string;
}

/** Ends the run alone. @returns false if the attempt is over. */
export async function failRun(
  db: Db,
  fence: Fence,
  failure: RunFailure,
  mail: MailRule,
): Promise<boolean> {
  return db.transaction(async (tx) => {
    const ended = await endRun(tx, fence, { state: 'failed', failure }, mail);
    if (ended) await announceRun(tx, fence.runId);
    return ended;
  });
}

async function endRun(
  tx: Transaction,
  fence: Fence,
  end: { readonly state: 'done' | 'failed'; readonly failure: RunFailure | null },
  mail: MailRule,
): Promise<boolean> {
  const [run] = await tx
    .update(runs)
    .set({
      state: end.state,
      failureCode: end.failure?.code ?? null,
      failureMessage: end.failure?.message ?? null,
      finishedAt: sql`now()`,
    })
    .where(and(fenced(fence), inArray(runs.state, UNFINISHED)))
    .returning();
  if (!run) return false;
  const seconds = (Number(run.finishedAt) - Number(run.startedAt ?? run.finishedAt)) / 1000;
  if (run.requestedBy === null || seconds < mail.afterSeconds) return true;
  const [about] = await tx
    .select({ email: users.email, recipientName: users.name, datasetName: datasets.name })
    .from(revisions)
    .innerJoin(datasets, eq(datasets.id, revisions.datasetId))
    .innerJoin(users, eq(users.id, run.requestedBy))
    .where(eq(revisions.id, run.revisionId));
  if (!about) return true;
  const { email, ...names } = about;
  const text = mail.compose({
    id: run.id,
    workspaceId: run.workspaceId,
    number: run.number,
    ...names,
    state: end.state,
    failureMessage: run.failureMessage,
    seconds,
  });
  await createMail(tx, run.workspaceId, { recipient: email, ...text });
  return true;
}
