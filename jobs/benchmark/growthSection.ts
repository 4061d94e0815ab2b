import type { Network } from '../engine/types';
import { growthExponent, median, seconds } from './figures';
import { constantProbability, preferentialAttachment } from './graphs';
import type { Options } from './options';
import { matrixTimes, poolOf, warmUp } from './poolRuns';

interface Family {
  readonly name: string;
  readonly sizes: readonly number[];
  readonly network: (nodeCount: number) => Network;
}

const FAMILIES: readonly Family[] = [
  {
    name: 'A p=.2',
    sizes: [80, 120, 170, 230, 300],
    network: (n) => constantProbability(n, 0.2, 1),
  },
  {
    name: 'C in order of attachment',
    sizes: [125, 250, 500, 1000, 2000],
    network: (n) => preferentialAttachment(n, 10, 1),
  },
  {
    name: 'C in random order',
    sizes: [100, 200, 400, 700, 1000],
    network: (n) => preferentialAttachment(n, 10, 1, 'random'),
  },
];

/** How the time of a whole matrix grows with the number of nodes, one thread. */
export async function growthSection(options: Options): Promise<void> {
  const { dimension } = options;
  console.log(
    `\n# Growth with the number of nodes, D = ${dimension}, 1 thread\n` +
      'Exponent: the slope of the least-squares line through (log n, log time); of the last step in brackets.',
  );
  for (const family of FAMILIES) {
    const chosen = options.graphs.some((start) => start.startsWith(family.name.charAt(0)));
    if (options.graphs.length === 0 || chosen) await printGrowth(family, options);
  }
}

async function printGrowth({ name, sizes, network }: Family, options: Options): Promise<void> {
  const pool = poolOf(1);
  await warmUp(pool);
  const points: { size: number; time: number }[] = [];
  for (const size of sizes) {
    if (expected(points, size) > options['growth-seconds']) break;
    const [own] = await matrixTimes(pool, network(size), [options.dimension], options.repeats);
    points.push({ size, time: median(own!) });
  }
  await pool.close();
  const list = points.map(({ size, time }) => `n = ${size}: ${seconds(time)}`).join(', ');
  const slopes =
    points.length < 2
      ? 'too few sizes within the time'
      : `exponent ${growthExponent(points).toFixed(2)} (${growthExponent(points.slice(-2)).toFixed(2)})`;
  console.log(`  ${name}: ${list}; ${slopes}`);
}

/** Seconds of the next size by the growth so far. */
function expected(points: readonly { size: number; time: number }[], size: number): number {
  if (points.length < 2) return 0;
  const last = points.at(-1)!;
  return last.time * (size / last.size) ** growthExponent(points.slice(-2));
}
