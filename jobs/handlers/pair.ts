import { answerPair, claimPair } from '../../db/repositories/pairDetails';
import { describe } from '../../db/repositories/runWork';
import type { BarCycle, Barcode } from '../engine/types';
import type { PairResult } from '../pool/tasks';
import type { Payload } from '../queue/jobs';
import type { Context } from './context';
import { failureOf } from './outcome';
import { subjectOf } from './subject';

const MOST_TRIES = 5;
/** A swap is a fraction of a run; one that takes longer is given up. Milliseconds. */
const LONGEST = 120_000;

/** Works one swap out in full and stores the answer for whoever waits. */
export async function pair({ runId, p, q }: Payload<'pair'>, context: Context): Promise<void> {
  const { db, pairPool, config, log, activity } = context;
  const tries = await claimPair(db, runId, { p, q });
  if (tries === null) return;
  if (tries > MOST_TRIES) {
    const failure = `This swap was begun ${MOST_TRIES} times and a worker was lost every time.`;
    return answerPair(db, runId, { p, q }, { failure });
  }
  const run = await describe(db, runId);
  const subject = run && (await subjectOf(run, context));
  if (!subject) return;
  const outcome = await pairPool.run<'pair'>(
    { kind: 'pair', subject, p, q, dimensions: run.dimensions },
    AbortSignal.any([AbortSignal.timeout(LONGEST), activity.closing]),
  );
  switch (outcome.kind) {
    case 'finished':
      return answerPair(db, runId, { p, q }, { detail: wire(outcome.result) });
    case 'stopped':
      activity.handOverIfClosing();
      return answerPair(
        db,
        runId,
        { p, q },
        { failure: 'This swap took longer than two minutes.' },
      );
    case 'refused':
    case 'broken':
    case 'crashed': {
      log.warn({ runId, p, q, outcome }, 'a swap was not worked out');
      const failure = failureOf(outcome, config.heapMegabytes);
      if (!failure) throw new Error(outcome.message);
      return answerPair(db, runId, { p, q }, { failure: failure.message });
    }
  }
}

const barsOf = (barcode: Barcode) =>
  barcode.map(({ births, deaths }) =>
    Array.from(births, (birth, k) => {
      const death = deaths[k] ?? Infinity;
      return [birth, death === Infinity ? null : death];
    }),
  );

/** Simplices as lists of positions; in dimension 0 each is a node. */
const cyclesOf = (cycles: readonly BarCycle[], k: number) =>
  cycles.map(({ bar, simplices }) => ({
    bar,
    simplices:
      simplices &&
      Array.from({ length: simplices.length / (k + 1) }, (_, i) =>
        Array.from(simplices.subarray(i * (k + 1), (i + 1) * (k + 1))),
      ),
  }));

/** As stored in pair_details.detail: lists instead of typed arrays, null for Infinity. */
const wire = ({ detail, similarity }: PairResult) => ({
  bound: detail.bound,
  similarity,
  distances: detail.distances,
  bettiGaps: detail.bettiGaps,
  recorded: barsOf(detail.recorded),
  swapped: barsOf(detail.swapped),
  matchings: detail.matchings.map((matching) =>
    matching.map(({ recorded, swapped, cost }) => [recorded, swapped, cost]),
  ),
  realising: detail.realising,
  cycles: detail.cycles.map(({ recorded, swapped }, k) => ({
    recorded: cyclesOf(recorded, k),
    swapped: cyclesOf(swapped, k),
  })),
});
