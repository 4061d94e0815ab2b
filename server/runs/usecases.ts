import type { z } from 'zod';
import type { createRunRequest, Run } from '#contract/runs';
import type { Db } from '../../db/client';
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
import { alreadyOver, longKey, otherParameters } from './errors';
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
 * many at once.
 *
 * @throws Failure `runs.too_large` where the revision's stored estimate is over the budget
 */
export async function startRun(
  db: Db,
  scope: Scope,
  request: z.output<typeof createRunRequest>,
  idempotencyKey: string | null,
): Promise<Run> {
  if (idempotencyKey !== null && idempotencyKey.length > LONGEST_KEY) throw longKey();
  // A repeat starts nothing: it is answered whatever has been counted since.
  if (!(await hasRunUnderKey(db, scope, idempotencyKey))) await requireRoom(db, scope, request);
  const made = await createRun(db, scope, { ...request, idempotencyKey });
  switch (made.kind) {
    case 'no_revision':
      throw notFound('revisions');
    case 'other_parameters':
      throw otherParameters();
    case 'created':
    case 'repeated':
      return readRun(db, scope, made.runId);
  }
}

/** Ends an unfinished run at once; stopping a stopped run changes nothing and is no error. */
export async function endRun(db: Db, scope: Scope, runId: string): Promise<Run> {
  const stopped = await stopRun(db, scope, runId);
  const run = await readRun(db, scope, runId);
  if (!stopped && run.state !== 'stopped') throw alreadyOver(run.state);
  return run;
}
