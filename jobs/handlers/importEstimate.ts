import { decodeFloat64, decodeUint32 } from '../../db/codecs/typedArrays';
import { answerImportEstimate, claimImportEstimate } from '../../db/repositories/importEstimates';
import { bettiSteps } from '../bettiSteps';
import { ESTIMATE_MARGIN, ESTIMATE_START_UP } from '../engine/index';
import type { Network } from '../engine/types';
import type { Subject } from '../pool/tasks';
import type { Payload } from '../queue/jobs';
import type { Context } from './context';
import { failureOf } from './outcome';

const MOST_TRIES = 5;
/** Milliseconds of counting. */
const LONGEST = 60_000;
const DIMENSION = 3;
/** The curves are only computed where they take moments: somebody may click on a pair meanwhile. */
const CURVES = { cliques: 500_000, seconds: 5 };

/** Counts what the full matrix of a draft would need, and draws its Betti curves where they are quick. */
export async function importEstimate(
  { importId, version }: Payload<'importEstimate'>,
  context: Context,
): Promise<void> {
  const { db, pairPool, config, log, activity } = context;
  const question = { importId, version };
  const refuse = (failure: string) => answerImportEstimate(db, question, { failure });
  const claimed = await claimImportEstimate(db, question);
  if (claimed === null) return;
  if (claimed.tries > MOST_TRIES) {
    return refuse(`This estimate was begun ${MOST_TRIES} times and a worker was lost every time.`);
  }
  const { limits } = config;
  const subject: Subject = {
    key: `import ${importId} ${version}`,
    network: networkOf(claimed),
    maxDimension: DIMENSION,
    limits,
  };
  const outcome = await pairPool.run<'estimate'>(
    {
      kind: 'estimate',
      subject,
      budget: { ...limits, seconds: config.mostSeconds },
      part: { kind: 'whole' },
      overlapping: null,
    },
    AbortSignal.any([AbortSignal.timeout(LONGEST), activity.closing]),
  );
  switch (outcome.kind) {
    case 'finished': {
      const { cliques, exact, pairs, seconds } = outcome.result.estimate;
      const total = cliques.reduce((sum, count) => sum + count, 0);
      const betti = exact && total <= CURVES.cliques ? await curvesOf(subject, context) : null;
      return answerImportEstimate(db, question, {
        estimate: {
          ...{ maxDimension: DIMENSION, cliques, exact, pairs, seconds },
          ...{ margin: ESTIMATE_MARGIN, startUp: ESTIMATE_START_UP, betti },
        },
      });
    }
    case 'stopped':
      activity.handOverIfClosing();
      return refuse('Counting the cliques of this network took longer than a minute.');
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

function networkOf(stored: { readonly entries: Uint8Array; readonly edges: Uint8Array }): Network {
  const entries = decodeFloat64(stored.entries);
  const edges = decodeUint32(stored.edges);
  const values = new Float64Array(new SharedArrayBuffer(entries.byteLength));
  values.set(entries);
  const shared = new Uint32Array(new SharedArrayBuffer(edges.byteLength));
  shared.set(edges);
  return { nodeCount: entries.length, edges: shared, values };
}

/** @returns the Betti curves in every dimension, or null where they are not there in time */
async function curvesOf(
  subject: Subject,
  { pairPool, activity, log }: Context,
): Promise<[number, number][][] | null> {
  const outcome = await pairPool.run<'plan'>(
    {
      kind: 'plan',
      subject,
      secondsPerBlock: 1,
      // The barcode is what is wanted; these are the fewest pairs that can be planned.
      part: { kind: 'within', positions: 1 },
      stored: null,
    },
    AbortSignal.any([AbortSignal.timeout(CURVES.seconds * 1000), activity.closing]),
  );
  if (outcome.kind === 'finished') return outcome.result.barcode.map(bettiSteps);
  log.info({ key: subject.key, outcome }, 'the curves of a draft were not computed');
  return null;
}
