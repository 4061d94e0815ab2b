import { prepare } from '../engine/index';
import type { Control, Network } from '../engine/types';
import { median, megabytes, seconds, spread, times } from './figures';
import { benchGraphs } from './graphs';
import type { Options } from './options';
import { gudhiSeconds, ripserSeconds, sampleSwaps, type GudhiTimes } from './outside';
import { memoryOf, type Memory } from './memory/memoryOf';
import { LIMITS, matrixTimes, poolOf, warmUp } from './poolRuns';

const QUIET: Control = { shouldStop: () => false, onProgress: () => undefined };

export const pairsOf = ({ nodeCount }: Network): number => (nodeCount * (nodeCount - 1)) / 2;

/** Seconds of the repetitions by highest dimension, the largest first. */
type OwnTimes = readonly { readonly dimension: number; readonly seconds: readonly number[] }[];

/** Every dimension from D down to 1 on one warm pool. */
async function ownTimes(network: Network, threads: number, options: Options): Promise<OwnTimes> {
  const pool = poolOf(threads);
  await warmUp(pool);
  const least = Math.min(1, options.dimension);
  const dimensions = Array.from(
    { length: options.dimension - least + 1 },
    (_, i) => options.dimension - i,
  );
  const seconds = await matrixTimes(pool, network, dimensions, options.repeats);
  await pool.close();
  return dimensions.map((dimension, i) => ({ dimension, seconds: seconds[i]! }));
}

/** Whole-matrix times of one and two threads, and sampled swaps of GUDHI and ripser beside them. */
export async function matrixSection(options: Options): Promise<void> {
  const { graphs, dimension } = options;
  console.log(
    `\n# Whole matrices, D = ${dimension}, distances and Betti gaps included\n` +
      'Plan, tables and all pairs through a warm pool; median (least–most) of the repetitions. Memory: ' +
      'most bytes of the tables and columns, shared ones once; most resident memory of a process that ' +
      'computes this matrix alone, and in brackets before it. Outside programs: the median swap of a sample times ' +
      'the number of pairs; ratio to one thread at that median (at the quickest–slowest swap). GUDHI ' +
      'with its own bottleneck distance, the better of plain and edge-collapsed; ripser net of its ' +
      'start, barcodes only.',
  );
  const totals = { slower: [] as string[] };
  for (const { name, network: make } of benchGraphs) {
    if (graphs.length > 0 && !graphs.some((start) => name.startsWith(start))) continue;
    const network = make();
    const one = await ownTimes(network, 1, options);
    const two = await ownTimes(network, 2, options);
    console.log(`\n${name}: ${pairsOf(network).toLocaleString('en')} pairs`);
    printOwn(one, two);
    for (const threads of [1, 2]) printMemory(threads, memoryOf(name, dimension, threads));
    printLower(name, one, two, totals.slower);
    printOutside(network, median(one[0]!.seconds), options);
  }
  if (dimension > 1) {
    const { slower } = totals;
    console.log(
      slower.length === 0
        ? '\nFewer dimensions took less time throughout.'
        : `\nFewer dimensions took longer in: ${slower.join('; ')}.`,
    );
  }
}

function printOwn([one]: OwnTimes, [two]: OwnTimes): void {
  const [a, b] = [one!.seconds, two!.seconds];
  console.log(
    `  1 thread ${spread(a, seconds)}; 2 threads ${spread(b, seconds)}: ` +
      `${times(median(a) / median(b))} as fast`,
  );
}

function printMemory(threads: number, { counted, resident, idle }: Memory): void {
  console.log(
    `  memory, ${threads} thread(s): tables and columns ${megabytes(counted)}, ` +
      `process ${megabytes(resident)} (${megabytes(idle)} idle)`,
  );
}

/** The lower dimensions on one line; adds to `slower` what took longer than the highest. */
function printLower(name: string, one: OwnTimes, two: OwnTimes, slower: string[]): void {
  const parts: string[] = [];
  for (let i = 1; i < one.length; i++) {
    const { dimension } = one[i]!;
    const [a, b] = [one[i]!.seconds, two[i]!.seconds];
    parts.push(`D = ${dimension}: ${seconds(median(a))}, ${seconds(median(b))}`);
    for (const [threads, own] of [one, two].entries()) {
      const [more, fewer] = [own[0]!.seconds, own[i]!.seconds];
      if (median(fewer) <= median(more)) continue;
      const apart =
        Math.min(...fewer) > Math.max(...more) ? '' : ', within the repetitions’ spread';
      slower.push(`${name}, D = ${dimension}, ${threads + 1} thread(s)${apart}`);
    }
  }
  if (parts.length > 0) console.log(`  1 and 2 threads: ${parts.join('; ')}`);
}

function printOutside(network: Network, own: number, options: Options): void {
  const { dimension, swaps: count, outside } = options;
  const limit = options['outside-seconds'];
  if (count === 0) return;
  const cliques = prepare(network, dimension, LIMITS, QUIET).counts.total;
  if (cliques > 1000 * outside) {
    console.log(`  outside programs left out: ${cliques.toLocaleString('en')} cliques`);
    return;
  }
  const swaps = sampleSwaps(network.nodeCount, count);
  const pairs = pairsOf(network);
  const gudhi = gudhiSeconds(network, dimension, swaps, limit);
  const { name, seconds: loop } = gudhi.better;
  console.log(
    `  GUDHI, ${name}: ${compared(loop, pairs, own)}, peak ${megabytes(gudhi.bytes)}; ` +
      `built once, values assigned anew: ${compared(gudhi.kept, pairs, own)}`,
  );
  printDisagreements(gudhi);
  console.log(`  ripser: ${compared(ripserSeconds(network, dimension, swaps, limit), pairs, own)}`);
}

function printDisagreements({ disagreements }: GudhiTimes): void {
  if (disagreements === 0) return;
  console.log(
    `  Not the same barcode by all ways of GUDHI in ${disagreements} swaps of the sample!`,
  );
}

/** Time of the whole loop by the median swap, and its ratio to `own` with the spread of the sample. */
function compared(perSwap: readonly number[], pairs: number, own: number): string {
  if (perSwap.length === 0) return 'no swap within the time';
  const ratio = spread(
    perSwap.map((one) => (one * pairs) / own),
    times,
  );
  const n = perSwap.length === 1 ? '1 swap' : `${perSwap.length} swaps`;
  return `${seconds(median(perSwap) * pairs)} = ${ratio} of ${n}`;
}
