import { answerEstimate, claimEstimate } from '../../db/repositories/revisionEstimates';
import { readIntervals } from '../../db/repositories/runParts';
import { ESTIMATE_MARGIN, ESTIMATE_START_UP } from '../engine/index';
import { enginePart } from '../parts';
import type { Payload } from '../queue/jobs';
import type { Context } from './context';
import { failureOf } from './outcome';

const MOST_TRIES = 5;
/** Counting stops at the cap within seconds; one that takes longer is given up. Milliseconds. */
const LONGEST = 60_000;

/** Counts what a run of a revision would need and stores the answer for whoever waits. */
export async function estimate(
  { revisionId, maxDimension, partKey }: Payload<'estimate'>,
  context: Context,
): Promise<void> {
  const { db, networks, pairPool, config, log, activity } = context;
  const question = { revisionId, maxDimension, partKey };
  const refuse = (failure: string) => answerEstimate(db, question, { failure });
  const claimed = await claimEstimate(db, question);
  if (claimed === null) return;
  if (claimed.tries > MOST_TRIES) {
    return refuse(`This estimate was begun ${MOST_TRIES} times and a worker was lost every time.`);
  }
  // Both scales order the nodes alike, so one count serves them.
  const wanted = { workspaceId: claimed.workspaceId, revisionId, scale: 'entry' as const };
  const network = await networks.of(wanted);
  if (!network) return;
  const { limits } = config;
  const budget = { ...limits, seconds: config.mostSeconds };
  const nodes = await readIntervals(db, claimed.workspaceId, revisionId);
  const part = enginePart(claimed.part, nodes);
  const overlapping = enginePart({ kind: 'overlapping' }, nodes);
  const subject = { key: `${revisionId} entry ${maxDimension}`, network, maxDimension, limits };
  const outcome = await pairPool.run<'estimate'>(
    { kind: 'estimate', subject, budget, part, overlapping },
    AbortSignal.any([AbortSignal.timeout(LONGEST), activity.closing]),
  );
  switch (outcome.kind) {
    case 'finished':
      return answerEstimate(db, question, {
        estimate: {
          ...outcome.result.estimate,
          ways: outcome.result.ways,
          margin: ESTIMATE_MARGIN,
          startUp: ESTIMATE_START_UP,
          allowed: budget,
        },
      });
    case 'stopped':
      activity.handOverIfClosing();
      return refuse('Counting the cliques of this revision took longer than a minute.');
    case 'refused':
    case 'broken':
    case 'crashed': {
      log.warn({ ...question, outcome }, 'an estimate was not made');
      const failure = failureOf(outcome, config.heapMegabytes);
      if (!failure) throw new Error(outcome.message);
      return refuse(failure.message);
    }
  }
}
