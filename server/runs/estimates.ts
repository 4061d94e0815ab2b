import type { RunPart } from '#contract/enums';
import type { RunEstimate } from '#contract/runs';
import { runEstimate } from '#contract/runs';
import type { Db } from '../../db/client';
import type { Listener } from '../../db/listener';
import {
  askEstimate,
  findEstimate,
  estimateName,
  type EstimateAnswer,
} from '../../db/repositories/revisionEstimates';
import { partKey } from '../../db/repositories/runParts';
import { findRevisionSize } from '../../db/repositories/revisions';
import type { Scope } from '../../db/repositories/scope';
import { notFound } from '../http/parse';
import { bellFor } from './bell';
import { estimateLate, estimateRefused, tooLarge } from './errors';
import { requirePart } from './parts';
import { refusalOf } from './refusal';

/** Milliseconds that a reader waits for a worker. */
const DEADLINE = 15_000;
/** Milliseconds between looks, should a notification be lost. */
const POLL = 1_000;

/** What a worker stored. */
const storedEstimate = runEstimate.omit({ maxDimension: true, part: true, refusal: true });

/** What is asked of the estimate: a part of the pairs of a revision, up to a dimension. */
export interface EstimateWanted {
  readonly revisionId: string;
  readonly maxDimension: number;
  readonly part: RunPart;
}

/** What a run would need: from the store, or counted by a worker while the reader waits. */
export async function readEstimate(
  db: Db,
  listener: Listener,
  scope: Scope,
  asked: EstimateWanted,
  signal: AbortSignal,
): Promise<RunEstimate> {
  const nodeCount = await findRevisionSize(db, scope, asked.revisionId);
  if (nodeCount === null) throw notFound('revisions');
  const question = { ...asked, part: requirePart(asked.part, nodeCount) };
  const answer = await answerTo(db, listener, scope, question, signal);
  if (answer.kind === 'failed') throw estimateRefused(answer.failure);
  if (answer.kind === 'waiting') throw estimateLate();
  return present(answer.estimate, question);
}

/**
 * Lets a run pass unless the stored estimate says that it cannot fit; without one the engine's own
 * guard decides.
 *
 * @throws Failure `runs.too_large`
 */
export async function requireRoom(db: Db, scope: Scope, question: EstimateWanted): Promise<void> {
  const known = await findEstimate(db, scope, keyed(question));
  if (known?.kind !== 'answered') return;
  const { refusal } = present(known.estimate, question);
  if (refusal !== null) throw tooLarge(refusal);
}

const keyed = ({ part, ...question }: EstimateWanted) => ({ ...question, partKey: partKey(part) });

function present(estimate: unknown, { maxDimension, part }: EstimateWanted): RunEstimate {
  const stored = storedEstimate.parse(estimate);
  return { maxDimension, part, ...stored, refusal: refusalOf(maxDimension, stored) };
}

/** Asks once and waits. @returns `waiting` if no worker answered in time; the question stays. */
async function answerTo(
  db: Db,
  listener: Listener,
  scope: Scope,
  { part, ...asked }: EstimateWanted,
  signal: AbortSignal,
): Promise<EstimateAnswer> {
  const question = { ...asked, partKey: partKey(part) };
  const bell = bellFor(listener, 'estimate_answered', estimateName(question));
  try {
    let answer = await findEstimate(db, scope, question);
    if (answer === null) {
      await askEstimate(db, scope, asked, part);
      answer = { kind: 'waiting' };
    }
    const until = Date.now() + DEADLINE;
    while (answer.kind === 'waiting' && Date.now() < until && !signal.aborted) {
      await bell.rung(Math.min(POLL, until - Date.now()));
      answer = (await findEstimate(db, scope, question)) ?? answer;
    }
    return answer;
  } finally {
    bell.remove();
  }
}
