import type { z } from 'zod';
import { WHOLE } from '#contract/enums';
import type { createRunRequest, Run, runFocusRequest, StartedRun } from '#contract/runs';
import type { Db } from '../../db/client';
import { findRevisionSize, listNodes } from '../../db/repositories/revisions';
import { extendRun, setFocus } from '../../db/repositories/runOrders';
import { listLanded } from '../../db/repositories/runBlocks';
import {
  createRun,
  findRun,
  hasRunUnderKey,
  stopRun,
  type RunView,
} from '../../db/repositories/runs';
import type { Scope } from '../../db/repositories/scope';
import { notFound } from '../http/parse';
import { requireRoom } from './estimates';
import { arrivalsOf } from './arrivals';
import { alreadyOver, longKey, nothingToExtend, nothingToFocus, otherParameters } from './errors';
import { focusOf, requirePart } from './parts';
import { presentRun } from './presenter';

const LONGEST_KEY = 200;

/** @throws Failure 404 if the workspace has no such run */
export async function requireRun(db: Db, scope: Scope, runId: string): Promise<RunView> {
  const run = await findRun(db, scope, runId);
  if (run === null) throw notFound('runs');
  return run;
}

/** The run with its stored blocks. */
export async function readRun(db: Db, scope: Scope, runId: string): Promise<Run> {
  const run = await requireRun(db, scope, runId);
  return presentRun(run, await listLanded(db, scope, runId));
}

/**
 * Queues a run. The same key of the same person answers the same run, however often and however
 * many at once, and so does a request that equals a run which is done or under way.
 *
 * @throws Failure `runs.too_large` where the revision's stored estimate is over the budget
 */
export async function startRun(
  db: Db,
  scope: Scope,
  request: z.output<typeof createRunRequest>,
  idempotencyKey: string | null,
): Promise<StartedRun> {
  if (idempotencyKey !== null && idempotencyKey.length > LONGEST_KEY) throw longKey();
  const { revisionId, dimensions } = request;
  const nodeCount = await findRevisionSize(db, scope, revisionId);
  if (nodeCount === null) throw notFound('revisions');
  const part = requirePart(request.part, nodeCount);
  const maxDimension = Math.max(...dimensions);
  // A repeat starts nothing: it is answered whatever has been counted since.
  if (!(await hasRunUnderKey(db, scope, idempotencyKey))) {
    await requireRoom(db, scope, { revisionId, maxDimension, part });
  }
  const made = await createRun(db, scope, { ...request, part, idempotencyKey });
  switch (made.kind) {
    case 'no_revision':
      throw notFound('revisions');
    case 'other_parameters':
      throw otherParameters();
    case 'created':
    case 'repeated':
    case 'found':
      return { ...(await readRun(db, scope, made.runId)), found: made.kind === 'found' };
  }
}

/**
 * Makes a finished part run whole without computing a pair again.
 * @throws Failure `runs.nothing_to_extend`; `runs.too_large` as `startRun`
 */
export async function completeRun(db: Db, scope: Scope, runId: string): Promise<Run> {
  const run = await requireRun(db, scope, runId);
  const maxDimension = Math.max(...run.dimensions);
  await requireRoom(db, scope, { revisionId: run.revisionId, maxDimension, part: WHOLE });
  if (!(await extendRun(db, scope, runId))) {
    const { state, part } = await requireRun(db, scope, runId);
    throw nothingToExtend(
      part.kind === 'whole'
        ? `The run covers every pair already; it is ${state}.`
        : `A run is extended once it is done; this one is ${state}.`,
    );
  }
  return readRun(db, scope, runId);
}

/**
 * Lets the pairs that a reader looks at go first; no result depends on it.
 * @throws Failure `runs.nothing_left` once the run is over
 */
export async function focusRun(
  db: Db,
  scope: Scope,
  runId: string,
  request: z.output<typeof runFocusRequest>,
): Promise<void> {
  const run = await requireRun(db, scope, runId);
  const nodes = await listNodes(db, scope, run.revisionId);
  const focus = focusOf(request, arrivalsOf(nodes.map(({ entry }) => entry)));
  if (!(await setFocus(db, scope, runId, focus))) throw nothingToFocus(run.state);
}

/** Ends an unfinished run at once; stopping a stopped run changes nothing and is no error. */
export async function endRun(db: Db, scope: Scope, runId: string): Promise<Run> {
  const stopped = await stopRun(db, scope, runId);
  const run = await readRun(db, scope, runId);
  if (!stopped && run.state !== 'stopped') throw alreadyOver(run.state);
  return run;
}
