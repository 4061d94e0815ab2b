/**
 * `npm run bench [-- --graphs A,C --dimension 3 --swaps 9]`: whole-matrix times of this
 * engine with one and two threads of the pool, and sampled swaps of GUDHI and ripser on the same
 * graphs in the same run. Times of outside programs are extrapolated from the sample's median; their
 * spread (smallest and largest swap) is printed as the ratio's.
 */
import { availableParallelism, cpus } from 'node:os';
import { join } from 'node:path';
import { performance } from 'node:perf_hooks';
import { parseArgs } from 'node:util';
import { computeRows, ENGINE_VERSION, planBlocks, prepare } from '../engine/index';
import type { Control, Limits, Network } from '../engine/types';
import { openPool, type Pool } from '../pool/pool';
import { benchGraphs } from './graphs';
import { gudhiSeconds, median, ripserSeconds, sampleSwaps } from './outside';

const QUIET: Control = { shouldStop: () => false, onProgress: () => undefined };
const LIMITS: Limits = { simplices: 200_000_000, bytes: 8 * 2 ** 30 };

interface Own {
  readonly seconds: number;
  readonly setUp: number;
  readonly megabytes: number;
}

/** All rows in this thread. */
function oneThread(network: Network, maxDimension: number): Own {
  const start = performance.now();
  const prepared = prepare(network, maxDimension, LIMITS, QUIET);
  const ready = performance.now();
  computeRows(
    prepared,
    Uint32Array.from({ length: network.nodeCount }, (_, p) => p),
    QUIET,
  );
  return {
    seconds: (performance.now() - start) / 1000,
    setUp: (ready - start) / 1000,
    megabytes: prepared.peakBytes / 1e6,
  };
}

/** The planned blocks through the pool; every thread prepares its own tables, as in a run. */
async function throughPool(
  pool: Pool,
  key: string,
  network: Network,
  maxDimension: number,
): Promise<number> {
  const blocks = planBlocks(prepare(network, maxDimension, LIMITS, QUIET), 1.5);
  const subject = { key, network, maxDimension, limits: LIMITS };
  const never = new AbortController().signal;
  const start = performance.now();
  const outcomes = await Promise.all(
    blocks.map((rows) => pool.run<'rows'>({ kind: 'rows', subject, rows }, never)),
  );
  if (outcomes.some(({ kind }) => kind !== 'finished'))
    throw new Error(`A block of ${key} failed.`);
  return (performance.now() - start) / 1000;
}

const write = (seconds: number): string => (seconds < 10 ? seconds.toFixed(2) : seconds.toFixed(0));

function ratios(perSwap: readonly number[], pairs: number, own: number): string {
  if (perSwap.length === 0) return '–';
  const of = (seconds: number) => Math.round((seconds * pairs) / own).toLocaleString('en');
  return `${write(median(perSwap) * pairs)} s = ${of(median(perSwap))}× (${of(Math.min(...perSwap))}–${of(Math.max(...perSwap))})`;
}

const { values: options } = parseArgs({
  options: {
    graphs: { type: 'string', default: '' },
    dimension: { type: 'string', default: '3' },
    swaps: { type: 'string', default: '9' },
    /** Graphs with more cliques than this, in thousands, are not given to the outside programs. */
    outside: { type: 'string', default: '2000' },
  },
});
const dimension = Number(options.dimension);
const swapCount = Number(options.swaps);
const chosen = benchGraphs.filter(({ name }) =>
  options.graphs.split(',').some((start) => name.startsWith(start)),
);
const pool = openPool({
  script: join(import.meta.dirname, 'thread.js'),
  threads: 2,
  heapMegabytes: 4096,
  onError: (error) => console.error(error),
});

console.log(
  `engine ${ENGINE_VERSION}, D = ${dimension}, Node.js ${process.versions.node}, ${availableParallelism()} × ${cpus()[0]?.model ?? 'processor'}`,
);
console.log(
  'graph | pairs | 1 thread | of it set-up | peak | 2 threads | GUDHI loop, ratio | ripser loop, ratio',
);
for (const { name, network: make } of chosen) {
  const network = make();
  const pairs = (network.nodeCount * (network.nodeCount - 1)) / 2;
  const own = oneThread(network, dimension);
  const two = await throughPool(pool, name, network, dimension);
  const cliques = prepare(network, dimension, LIMITS, QUIET).counts.total;
  const swaps =
    cliques > 1000 * Number(options.outside) ? [] : sampleSwaps(network.nodeCount, swapCount);
  const gudhi = swaps.length > 0 ? gudhiSeconds(network, dimension, swaps) : [];
  const ripser = swaps.length > 0 ? ripserSeconds(network, dimension, swaps) : [];
  console.log(
    [
      name,
      pairs.toLocaleString('en'),
      `${write(own.seconds)} s`,
      `${write(own.setUp)} s`,
      `${own.megabytes.toFixed(0)} MB`,
      `${write(two)} s = ${(own.seconds / two).toFixed(2)}×`,
      ratios(gudhi, pairs, own.seconds),
      ratios(ripser, pairs, own.seconds),
    ].join(' | '),
  );
}
await pool.close();
