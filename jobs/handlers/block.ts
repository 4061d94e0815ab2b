import { encodeBlockResult } from '../../db/codecs/blockResult';
import { decodeUint32 } from '../../db/codecs/typedArrays';
import { findMissingRows } from '../../db/repositories/runBlocks';
import { claimRun, failRun, finishIfComplete, storeBlock } from '../../db/repositories/runWork';
import { ENGINE_VERSION } from '../engine/index';
import type { Payload } from '../queue/jobs';
import type { Context } from './context';
import { settle } from './outcome';
import { subjectOf } from './subject';

/** Computes one block of pairs and stores it, unless somebody has. */
export async function block(payload: Payload<'block'>, context: Context): Promise<void> {
  const { db, activity, pool, mailRule } = context;
  const fence = { runId: payload.runId, attempt: payload.attempt };
  const run = await claimRun(db, fence);
  if (!run) return;
  const stored = await findMissingRows(db, fence.runId, payload.block);
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
    const outcome = await pool.run<'rows'>(
      { kind: 'rows', subject, rows: decodeUint32(stored) },
      signal,
    );
    if (outcome.kind !== 'finished') return settle(outcome, fence, context);
    await storeBlock(db, fence, payload.block, encodeBlockResult(outcome.result), mailRule);
  });
}

/** When every block has ended: the last one has ended the run too, so this finds nothing to do. */
export async function finish(
  { runId, attempt }: Payload<'finish'>,
  { db, mailRule }: Context,
): Promise<void> {
  await finishIfComplete(db, { runId, attempt }, mailRule);
}
