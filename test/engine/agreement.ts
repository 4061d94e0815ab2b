import type { Network } from '../../jobs/engine/types';
import { arrival, fastMatrix, type Options } from './fastMatrix';
import { allCliques, slowBarcode, slowBettiGap, slowDistance } from './slowPath';

/** What differs between the fast and the slow path; empty if nothing does. Counts the swaps. */
export function disagreements(
  network: Network,
  options: Options,
): { swaps: number; found: string[] } {
  const maxDimension = options.maxDimension ?? 3;
  const { rows } = arrival(network);
  const cliques = allCliques(network, maxDimension + 2);
  const before = slowBarcode(cliques, network.values, maxDimension);
  const fast = fastMatrix(network, options);
  const found: string[] = [];
  const compare = (what: string, got: unknown, wanted: unknown) => {
    const [x, y] = [JSON.stringify(got, infinite), JSON.stringify(wanted, infinite)];
    if (x !== y) found.push(`${what}: ${x} instead of ${y}`);
  };
  compare('recorded barcode', fast.recorded, before);
  const { pairCount, distances, bettiGaps } = fast.results;
  let pair = 0;
  for (let p = 0; p < rows.length; p++) {
    for (let q = p + 1; q < rows.length; q++, pair++) {
      const values = network.values.slice();
      [values[rows[p]!], values[rows[q]!]] = [values[rows[q]!]!, values[rows[p]!]!];
      const after = slowBarcode(cliques, values, maxDimension);
      compare(`barcode of swap ${p}, ${q}`, fast.swapped[pair], after);
      for (let k = 0; k <= maxDimension; k++) {
        const at = k * pairCount + pair;
        compare(`d${k} of swap ${p}, ${q}`, distances[at], slowDistance(before[k]!, after[k]!));
        const gap = slowBettiGap(before[k]!, after[k]!, values);
        compare(`g${k} of swap ${p}, ${q}`, bettiGaps[at], gap);
      }
    }
  }
  return { swaps: pair, found };
}

/** JSON knows neither infinity nor typed arrays. */
function infinite(_key: string, value: unknown): unknown {
  if (value === Infinity) return 'inf';
  return value instanceof Float64Array ? [...value] : value;
}
