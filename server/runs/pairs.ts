import { z } from 'zod';
import { barCycle, barsSchema, type BarCycle, type PairDetail } from '#contract/runs';
import type { Db } from '../../db/client';
import type { Listener } from '../../db/listener';
import {
  askPair,
  findAnswer,
  type PairAnswer,
  type Positions,
} from '../../db/repositories/pairDetails';
import { listNodes } from '../../db/repositories/revisions';
import type { Scope } from '../../db/repositories/scope';
import { notFound } from '../http/parse';
import { arrivalsOf } from './arrivals';
import { bellFor } from './bell';
import { pairLate, pairRefused } from './errors';
import { requireRun } from './usecases';

/** Milliseconds that a reader waits for a worker. */
const DEADLINE = 15_000;
/** Milliseconds between looks, should a notification be lost. */
const POLL = 1_000;

/** What a worker stored: bars and matchings by dimension, in arrival positions' own order. */
const storedDetail = z.object({
  bound: z.number(),
  similarity: z.number(),
  distances: z.array(z.number()),
  bettiGaps: z.array(z.number().int()),
  recorded: z.array(barsSchema),
  swapped: z.array(barsSchema),
  matchings: z.array(z.array(z.tuple([z.number().int(), z.number().int(), z.number()]))),
  realising: z.array(z.number().int()),
  // Details that were stored before cycles were have none.
  cycles: z
    .array(z.object({ recorded: z.array(barCycle), swapped: z.array(barCycle) }))
    .default([]),
});

export interface PairQuestion {
  readonly runId: string;
  /** Node rows, in either order. */
  readonly a: number;
  readonly b: number;
}

/** One swap in full: from the store, or worked out by a worker while the reader waits. */
export async function readPair(
  db: Db,
  listener: Listener,
  scope: Scope,
  { runId, a, b }: PairQuestion,
  signal: AbortSignal,
): Promise<PairDetail> {
  const run = await requireRun(db, scope, runId);
  const nodes = await listNodes(db, scope, run.revisionId);
  const { rowAt, positionOf } = arrivalsOf(nodes.map(({ entry }) => entry));
  const [first, second] = [positionOf[a], positionOf[b]];
  if (first === undefined || second === undefined || first === second) throw notFound('pairs');
  const positions = { p: Math.min(first, second), q: Math.max(first, second) };
  const answer = await answerTo(db, listener, scope, runId, positions, signal);
  if (answer.kind === 'failed') throw pairRefused(answer.failure);
  if (answer.kind === 'waiting') throw pairLate();
  return present(storedDetail.parse(answer.detail), rowAt, positions);
}

function present(
  stored: z.infer<typeof storedDetail>,
  rowAt: Uint32Array,
  { p, q }: Positions,
): PairDetail {
  const inRows = (cycles: readonly BarCycle[]): BarCycle[] =>
    cycles.map(({ bar, simplices }) => ({
      bar,
      simplices: simplices && simplices.map((nodes) => nodes.map((at) => rowAt[at] ?? 0)),
    }));
  return {
    a: rowAt[p] ?? 0,
    b: rowAt[q] ?? 0,
    bound: stored.bound,
    similarity: stored.similarity,
    dimensions: stored.distances.map((distance, dimension) => ({
      dimension,
      distance,
      bettiGap: stored.bettiGaps[dimension] ?? 0,
      recorded: stored.recorded[dimension] ?? [],
      swapped: stored.swapped[dimension] ?? [],
      matching: stored.matchings[dimension] ?? [],
      realising: stored.realising[dimension] ?? -1,
      cycles: {
        recorded: inRows(stored.cycles[dimension]?.recorded ?? []),
        swapped: inRows(stored.cycles[dimension]?.swapped ?? []),
      },
    })),
  };
}

/** Asks once and waits. @returns `waiting` if no worker answered in time; the question stays. */
async function answerTo(
  db: Db,
  listener: Listener,
  scope: Scope,
  runId: string,
  positions: Positions,
  signal: AbortSignal,
): Promise<PairAnswer> {
  const bell = bellFor(listener, 'pair_answered', `${runId} ${positions.p} ${positions.q}`);
  try {
    let answer = await findAnswer(db, scope, runId, positions);
    if (answer === null) {
      await askPair(db, scope, runId, positions);
      answer = { kind: 'waiting' };
    }
    const until = Date.now() + DEADLINE;
    while (answer.kind === 'waiting' && Date.now() < until && !signal.aborted) {
      await bell.rung(Math.min(POLL, until - Date.now()));
      answer = (await findAnswer(db, scope, runId, positions)) ?? answer;
    }
    return answer;
  } finally {
    bell.remove();
  }
}
