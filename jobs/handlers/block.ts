import { decodeBlockPairs, type BlockPairs } from '../../db/codecs/blockPairs';
import { encodeBlockResult } from '../../db/codecs/blockResult';
import { findMissingPairs } from '../../db/repositories/runBlocks';
import { claimRun, failRun, finishIfComplete, storeBlock } from '../../db/repositories/runWork';
import { ENGINE_VERSION } from '../engine/index';
import type { PairResults } from '../engine/types';
import type { Pool } from '../pool/pool';
import type { Outcome, Subject, TimeLimit } from '../pool/tasks';
import type { Payload } from '../queue/jobs';
import type { Context } from './context';
import { settle } from './outcome';
import { subjectOf } from './subject';
import { timeLeft } from './timeLimit';

/** Computes one block of pairs and stores it, unless somebody has. */
export async function block(payload: Payload<'block'>, context: Context): Promise<void> {
  const { db, activity, pool, config, mailRule, workerName } = context;
  const fence = { runId: payload.runId, attempt: payload.attempt };
  const run = await claimRun(db, fence);
  if (!run) return;
  const stored = await findMissingPairs(db, fence.runId, payload.block);
  if (!stored) return;
  if (run.engineVersion !== ENGINE_VERSION) {
    // Two versions must not fill one matrix: its bytes would depend on who computed what.
    const message = `The run was begun by engine version ${run.engineVersion} and this worker has ${ENGINE_VERSION}. Start it again.`;
    await failRun(db, fence, { code: 'engine.version_changed', message }, mailRule);
    return;
  }
  const subject = await subjectOf(run, context);
  if (!subject) return;
  await activity.during(fence, async (signal) => {
    const shared = { subject, timeLimit: timeLeft(run, config) };
    const outcome = await compute(pool, shared, decodeBlockPairs(stored), signal);
    if (outcome.kind !== 'finished') return settle(outcome, fence, context);
    const { result, seconds = 0 } = outcome;
    const computed = { block: payload.block, result: encodeBlockResult(result), seconds };
    await storeBlock(db, fence, { ...computed, storedBy: workerName }, mailRule);
  });
}

/** Whole rows go to the thread as rows; a list of all their pairs would say nothing more. */
const compute = (
  pool: Pool,
  shared: { readonly subject: Subject; readonly timeLimit: TimeLimit },
  { rows, choice }: BlockPairs,
  signal: AbortSignal,
): Promise<Outcome<PairResults>> =>
  choice === null
    ? pool.run<'rows'>({ kind: 'rows', ...shared, rows }, signal)
    : pool.run<'pairs'>({ kind: 'pairs', ...shared, choice: { rows, ...choice } }, signal);

/** When every block has ended: the last one has ended the run too, so this finds nothing to do. */
export async function finish(
  { runId, attempt }: Payload<'finish'>,
  { db, mailRule }: Context,
): Promise<void> {
  await finishIfComplete(db, { runId, attempt }, mailRule);
}
