import type { RunEstimate } from '#contract/runs';
import { runEstimate } from '#contract/runs';
import type { Db } from '../../db/client';
import type { Listener } from '../../db/listener';
import { hasRevision } from '../../db/repositories/revisions';
import {
  askEstimate,
  findEstimate,
  type EstimateAnswer,
  type EstimateQuestion,
} from '../../db/repositories/revisionEstimates';
import type { Scope } from '../../db/repositories/scope';
import { notFound } from '../http/parse';
import { bellFor } from './bell';
import { estimateLate, estimateRefused, tooLarge } from './errors';
import { refusalOf } from './refusal';

/** Milliseconds that a reader waits for a worker. */
const DEADLINE = 15_000;
/** Milliseconds between looks, should a notification be lost. */
const POLL = 1_000;

/** What a worker stored. */
const storedEstimate = runEstimate.omit({ maxDimension: true, refusal: true });

/** What a run would need: from the store, or counted by a worker while the reader waits. */
export async function readEstimate(
  db: Db,
  listener: Listener,
  scope: Scope,
  question: EstimateQuestion,
  signal: AbortSignal,
): Promise<RunEstimate> {
  if (!(await hasRevision(db, scope, question.revisionId))) throw notFound('revisions');
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
export async function requireRoom(
  db: Db,
  scope: Scope,
  { revisionId, dimensions }: { readonly revisionId: string; readonly dimensions: number[] },
): Promise<void> {
  const question = { revisionId, maxDimension: Math.max(...dimensions) };
  const known = await findEstimate(db, scope, question);
  if (known?.kind !== 'answered') return;
  const { refusal } = present(known.estimate, question);
  if (refusal !== null) throw tooLarge(refusal);
}

function present(estimate: unknown, { maxDimension }: EstimateQuestion): RunEstimate {
  const stored = storedEstimate.parse(estimate);
  return { maxDimension, ...stored, refusal: refusalOf(maxDimension, stored) };
}

/** Asks once and waits. @returns `waiting` if no worker answered in time; the question stays. */
async function answerTo(
  db: Db,
  listener: Listener,
  scope: Scope,
  question: EstimateQuestion,
  signal: AbortSignal,
): Promise<EstimateAnswer> {
  const name = `${question.revisionId} ${question.maxDimension}`;
  const bell = bellFor(listener, 'estimate_answered', name);
  try {
    let answer = await findEstimate(db, scope, question);
    if (answer === null) {
      await askEstimate(db, scope, question);
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
