import { encodeBarcode } from '../../db/codecs/barcode';
import { encodePartners } from '../../db/codecs/blockPairs';
import { encodeUint32 } from '../../db/codecs/typedArrays';
import { readIntervals } from '../../db/repositories/runParts';
import { claimRun, failRun, storePlan, type WorkRun } from '../../db/repositories/runWork';
import { enginePart, needsNodes } from '../parts';
import type { PlanResult } from '../pool/tasks';
import type { Payload } from '../queue/jobs';
import type { Context } from './context';
import { settle } from './outcome';
import { subjectOf } from './subject';
import { overTime, runSignal, tooLong } from './timeLimit';

/**
 * Prepares a run: its recorded barcode, its estimate and its blocks, stored once. The plan of an
 * extension holds the pairs that are not stored yet.
 */
export async function plan({ runId, attempt }: Payload<'plan'>, context: Context): Promise<void> {
  const { db, activity, pool, config, mailRule } = context;
  const fence = { runId, attempt };
  const run = await claimRun(db, fence);
  if (!run || run.blockCount !== null) return;
  const subject = await subjectOf(run, context);
  if (!subject) return;
  const parts = await partsOf(run, context);
  await activity.during(fence, async (signal) => {
    const limited = runSignal(run, config, signal);
    const outcome = await pool.run<'plan'>(
      { kind: 'plan', subject, secondsPerBlock: config.secondsPerBlock, ...parts },
      limited.signal,
    );
    if (limited.isOver()) return void (await failRun(db, fence, overTime(config), mailRule));
    if (outcome.kind !== 'finished') return settle(outcome, fence, context);
    const { seconds } = outcome.result.estimate;
    if (seconds > config.mostSeconds) {
      return void (await failRun(db, fence, tooLong(seconds, config), mailRule));
    }
    await storePlan(db, fence, stored(outcome.result), mailRule);
  });
}

async function partsOf(run: WorkRun, { db }: Context) {
  const { part, extendedFrom, workspaceId, revisionId } = run;
  const nodes =
    needsNodes(part) || (extendedFrom !== null && needsNodes(extendedFrom))
      ? await readIntervals(db, workspaceId, revisionId)
      : [];
  return {
    part: enginePart(part, nodes),
    stored: extendedFrom && enginePart(extendedFrom, nodes),
  };
}

const stored = (result: PlanResult) => ({
  engineVersion: result.engineVersion,
  estimate: result.estimate,
  barcode: encodeBarcode(result.barcode),
  blocks: result.blocks.map(({ rows, choice, pairs, seconds }) => ({
    pairs,
    cost: seconds,
    rows: encodeUint32(rows),
    partners: encodePartners({ rows, choice }),
  })),
});
