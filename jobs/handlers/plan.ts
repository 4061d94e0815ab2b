import { encodeBarcode } from '../../db/codecs/barcode';
import { encodePartners } from '../../db/codecs/blockPairs';
import { encodeUint32 } from '../../db/codecs/typedArrays';
import { readIntervals } from '../../db/repositories/runParts';
import { claimRun, failRun, storePlan, type WorkRun } from '../../db/repositories/runWork';
import { enginePart, needsNodes } from '../parts';
import type { Part } from '../engine/types';
import type { Pool } from '../pool/pool';
import type { PlanResult, Subject } from '../pool/tasks';
import type { Payload } from '../queue/jobs';
import type { Context } from './context';
import { settle } from './outcome';
import { subjectOf } from './subject';
import { tooLong } from './timeLimit';

/**
 * Prepares a run: its recorded barcode, its estimate and its blocks, stored once. The plan of an
 * extension holds the pairs that are not stored yet.
 */
export async function plan({ runId, attempt }: Payload<'plan'>, context: Context): Promise<void> {
  const { db, activity, pool, config, mailRule } = context;
  const { mostSeconds } = config;
  const fence = { runId, attempt };
  const run = await claimRun(db, fence);
  if (!run || run.blockCount !== null) return;
  const subject = await subjectOf(run, context);
  if (!subject) return;
  const parts = await partsOf(run, context);
  await activity.during(fence, async (signal) => {
    // Counted before anything is listed: a run that is too long does not hold a thread for its tables.
    const counted = await count(pool, { subject, part: parts.part, mostSeconds }, signal);
    if (counted.kind !== 'finished') return settle(counted, fence, context);
    const { seconds, exact } = counted.result.estimate;
    if (exact && seconds > mostSeconds) {
      return void (await failRun(db, fence, tooLong(seconds, mostSeconds), mailRule));
    }
    const outcome = await pool.run<'plan'>(
      { kind: 'plan', subject, secondsPerBlock: config.secondsPerBlock, ...parts },
      signal,
    );
    if (outcome.kind !== 'finished') return settle(outcome, fence, context);
    await storePlan(db, fence, stored(outcome.result), mailRule);
  });
}

interface Counting {
  readonly subject: Subject;
  readonly part: Part;
  readonly mostSeconds: number;
}

const count = (pool: Pool, { subject, part, mostSeconds }: Counting, signal: AbortSignal) =>
  pool.run<'estimate'>(
    {
      kind: 'estimate',
      subject,
      part,
      budget: { ...subject.limits, seconds: mostSeconds },
      overlapping: null,
    },
    signal,
  );

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
