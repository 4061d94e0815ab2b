import { setMaxListeners } from 'node:events';
import { join } from 'node:path';
import { performance } from 'node:perf_hooks';
import type { Limits, Network } from '../engine/types';
import { openPool, type Pool } from '../pool/pool';
import type { Outcome, Subject } from '../pool/tasks';
import { constantProbability } from './graphs';

export const LIMITS: Limits = { simplices: 200_000_000, bytes: 8 * 2 ** 30 };
/** As the worker plans, unless it is told otherwise. */
const SECONDS_PER_BLOCK = 1.5;

const never = new AbortController().signal;
// Every task of a matrix listens at once.
setMaxListeners(0, never);
let subjects = 0;

export const secondsSince = (start: number): number => (performance.now() - start) / 1000;

/** A pool of so many threads with one of the built scripts. */
export function poolOf(threads: number, script: 'thread' | 'firstForm' = 'thread'): Pool {
  return openPool({
    script: join(import.meta.dirname, `${script}.js`),
    threads,
    heapMegabytes: 4096,
    onError: (error) => console.error(error),
  });
}

/** A network under a key of its own, so that no thread has met it. */
export function freshSubject(network: Network, maxDimension: number): Subject {
  return { key: `${subjects++}`, network, maxDimension, limits: LIMITS };
}

function resultOf<R>(outcome: Outcome<R>): R {
  if (outcome.kind !== 'finished') throw new Error(`A task ended as ${JSON.stringify(outcome)}.`);
  return outcome.result;
}

export interface MatrixRun {
  readonly seconds: number;
  /** Most bytes of the engine's typed arrays on any thread, shared tables included. */
  readonly bytes: number;
}

/** The whole matrix as a worker computes it, plan and tables included. */
export async function wholeMatrix(
  pool: Pool,
  network: Network,
  maxDimension: number,
): Promise<MatrixRun> {
  const subject = freshSubject(network, maxDimension);
  const start = performance.now();
  const plan = { secondsPerBlock: SECONDS_PER_BLOCK, part: { kind: 'whole' } as const };
  const { blocks } = resultOf(
    await pool.run<'plan'>({ kind: 'plan', subject, stored: null, ...plan }, never),
  );
  const outcomes = await Promise.all(
    blocks.map(({ rows }) => pool.run<'rows'>({ kind: 'rows', subject, rows }, never)),
  );
  outcomes.forEach(resultOf);
  const bytes = outcomes.map((one) => (one.kind === 'finished' ? (one.bytes ?? 0) : 0));
  return { seconds: secondsSince(start), bytes: Math.max(0, ...bytes) };
}

/** The rows, each a task, in the order given; returns their seconds. */
export async function someRows(pool: Pool, subject: Subject, rows: Uint32Array): Promise<number> {
  const start = performance.now();
  const tasks = Array.from(rows, (p) =>
    pool.run<'rows'>({ kind: 'rows', subject, rows: Uint32Array.of(p) }, never),
  );
  for (const outcome of await Promise.all(tasks)) resultOf(outcome);
  return secondsSince(start);
}

const warmUpNetwork = (seed: number): Network => constantProbability(60, 0.4, 100 + seed);

/** Lets all threads of the engine compile their code on small matrices of every dimension. */
export async function warmUp(pool: Pool): Promise<void> {
  for (let seed = 0; seed < 3; seed++) {
    for (let d = 3; d >= 1; d--) await wholeMatrix(pool, warmUpNetwork(seed), d);
  }
}

/** The same for threads that know rows only. */
export async function warmUpRows(pool: Pool): Promise<void> {
  for (let seed = 0; seed < 3; seed++) {
    const network = warmUpNetwork(seed);
    const rows = Uint32Array.from({ length: network.nodeCount - 1 }, (_, p) => p);
    await someRows(pool, freshSubject(network, 3), rows);
  }
}

/** Seconds that the repetitions of a matrix may take together, and that short ones are to take. */
const LONG = 60;
const SHORT = 2;
/** Repetitions of a short matrix, of each given one. */
const MORE = 5;

/**
 * Seconds of the whole matrices of several dimensions, in turns, so that whatever else the machine
 * does meets all of them. A long one is not repeated, a short one more often.
 */
export async function matrixTimes(
  pool: Pool,
  network: Network,
  dimensions: readonly number[],
  repeats: number,
): Promise<number[][]> {
  const seconds = dimensions.map((): number[] => []);
  for (let round = 0; isWorthwhile(seconds[0]!, round, repeats); round++) {
    for (const [i, d] of dimensions.entries()) {
      seconds[i]!.push((await wholeMatrix(pool, network, d)).seconds);
    }
  }
  return seconds;
}

function isWorthwhile(own: readonly number[], round: number, repeats: number): boolean {
  if (round === 0) return true;
  if (round < repeats) return own[0]! * repeats < LONG;
  return round < MORE * repeats && own.reduce((sum, one) => sum + one, 0) < SHORT;
}
