import { rowSeconds } from '../engine/cost';
import { prepare } from '../engine/index';
import type { Control, Network } from '../engine/types';
import type { Pool } from '../pool/pool';
import type { Subject } from '../pool/tasks';
import { seconds, times } from './figures';
import { benchGraphs } from './graphs';
import { pairsOf } from './matrixSection';
import type { Options } from './options';
import { freshSubject, LIMITS, poolOf, someRows, warmUpRows } from './poolRuns';

const QUIET: Control = { shouldStop: () => false, onProgress: () => undefined };
/** Where nothing else is chosen. */
const GRAPHS = ['A n=500 p=.1', 'C n=2000'];
const THREADS = 2;

/** Rows that stand for the whole matrix: every k-th in the order of their estimated cost. */
interface Sample {
  readonly rows: Uint32Array;
  /** Estimated cost of all rows over that of these. */
  readonly share: number;
}

function sampleRows(cost: Float64Array, count: number): Sample {
  const order = Array.from(cost.keys()).filter((p) => cost[p]! > 0);
  order.sort((p, q) => cost[q]! - cost[p]! || p - q);
  const step = Math.max(1, order.length / count);
  const rows: number[] = [];
  for (let at = step / 2; at < order.length; at += step) rows.push(order[Math.floor(at)]!);
  const sum = (list: readonly number[]) => list.reduce((total, p) => total + cost[p]!, 0);
  return { rows: Uint32Array.from(rows), share: sum(order) / sum(rows) };
}

/** One of the two forms on one network, its tables made. */
interface Contender {
  readonly pool: Pool;
  readonly subject: Subject;
  /** Seconds of the tables, with one trifling row. */
  readonly setUp: number;
  /** Seconds of the rows computed so far. */
  rows: number;
}

async function contender(pool: Pool, network: Network, dimension: number): Promise<Contender> {
  const subject = freshSubject(network, dimension);
  const last = network.nodeCount - 2;
  const setUp = await someRows(pool, subject, Uint32Array.of(last));
  // On every thread, so that each has its buffers.
  await someRows(pool, subject, new Uint32Array(2 * THREADS).fill(last));
  return { pool, subject, setUp, rows: 0 };
}

/** Half of the rows first by one and then by the other, the other half the other way round. */
async function alternate(first: Contender, engine: Contender, rows: Uint32Array): Promise<void> {
  first.rows = engine.rows = 0;
  const half = (parity: number) => rows.filter((_, i) => i % 2 === parity);
  const run = async (one: Contender, part: Uint32Array) => {
    one.rows += await someRows(one.pool, one.subject, part);
  };
  await run(first, half(0));
  await run(engine, half(0));
  await run(engine, half(1));
  await run(first, half(1));
}

/** The plain first form of the algorithm beside the engine: the same rows, the same threads. */
export async function firstFormSection(options: Options): Promise<void> {
  const { dimension } = options;
  console.log(
    `\n# The plain first form of the algorithm, D = ${dimension}, ${THREADS} threads\n` +
      'One reduction of the recorded complex and of each row, explicit columns after every pair, whole ' +
      'barcodes, distances of whole diagrams by trial; without Betti gaps, which the engine includes.',
  );
  for (const { name, network: make } of benchGraphs) {
    const chosen = options.graphs.length > 0 ? options.graphs : GRAPHS;
    if (chosen.some((start) => name.startsWith(start))) await compareOn(name, make(), options);
  }
}

async function compareOn(name: string, network: Network, options: Options): Promise<void> {
  const { dimension } = options;
  const cost = rowSeconds(prepare(network, dimension, LIMITS, QUIET).counts);
  const pools = [poolOf(THREADS, 'firstForm'), poolOf(THREADS)] as const;
  for (const pool of pools) await warmUpRows(pool);
  const slow = await contender(pools[0], network, dimension);
  const fast = await contender(pools[1], network, dimension);
  let sample = sampleRows(cost, options['first-form-rows']);
  await alternate(slow, fast, sample.rows);
  const whole = slow.setUp + slow.rows * sample.share;
  if (sample.share > 1 && whole <= options['first-form-seconds']) {
    sample = sampleRows(cost, network.nodeCount);
    await alternate(slow, fast, sample.rows);
  }
  await Promise.all(pools.map((pool) => pool.close()));
  const all = sample.rows.length === network.nodeCount - 1;
  const total = ({ setUp, rows }: Contender) => setUp + rows * sample.share;
  console.log(
    `\n${name}: ${pairsOf(network).toLocaleString('en')} pairs, ` +
      (all ? 'all rows' : `${sample.rows.length} rows by their estimated cost`),
  );
  console.log(
    `  these rows: first form ${seconds(slow.rows)}, engine ${seconds(fast.rows)}: ` +
      `${times(slow.rows / fast.rows)}`,
  );
  console.log(
    `  whole matrix with tables${all ? '' : ', extrapolated by the cost of the rows'}: first form ` +
      `${seconds(total(slow))}, engine ${seconds(total(fast))}: ${times(total(slow) / total(fast))}`,
  );
}
