import { encodeBarcode } from '../../db/codecs/barcode';
import { encodeUint32 } from '../../db/codecs/typedArrays';
import { claimRun, storePlan } from '../../db/repositories/runWork';
import type { PlanResult } from '../pool/tasks';
import type { Payload } from '../queue/jobs';
import type { Context } from './context';
import { settle } from './outcome';
import { subjectOf } from './subject';

/** Prepares a run: its recorded barcode, its estimate and its blocks, stored once. */
export async function plan({ runId, attempt }: Payload<'plan'>, context: Context): Promise<void> {
  const { db, activity, pool, config, mailRule } = context;
  const fence = { runId, attempt };
  const run = await claimRun(db, fence);
  if (!run || run.blockCount !== null) return;
  const subject = await subjectOf(run, context);
  if (!subject) return;
  await activity.during(fence, async (signal) => {
    const outcome = await pool.run<'plan'>(
      { kind: 'plan', subject, secondsPerBlock: config.secondsPerBlock },
      signal,
    );
    if (outcome.kind !== 'finished') return settle(outcome, fence, context);
    await storePlan(db, fence, stored(outcome.result, run.nodeCount), mailRule);
  });
}

const stored = (result: PlanResult, nodeCount: number) => ({
  engineVersion: result.engineVersion,
  estimate: result.estimate,
  barcode: encodeBarcode(result.barcode),
  blocks: result.blocks.map((rows) => ({
    pairs: rows.reduce((sum, p) => sum + (nodeCount - 1 - p), 0),
    rows: encodeUint32(rows),
  })),
});
