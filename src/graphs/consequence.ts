import { pairAt, pairIndex, type Pair, type SwapMatrix } from './swapMatrix';

/** A pair with how far its swap moves the barcode. */
export interface Consequence {
  readonly index: number;
  readonly pair: Pair;
  readonly distance: number;
  readonly bound: number;
}

const share = ({ distance, bound }: Consequence): number => (bound === 0 ? 0 : distance / bound);

function consequenceOf(
  matrix: SwapMatrix,
  values: Float64Array,
  dimensions: readonly number[],
  index: number,
): Consequence {
  const pair = pairAt(matrix.nodeCount, index);
  const bound = (values[pair.q] ?? 0) - (values[pair.p] ?? 0);
  return { index, pair, distance: matrix.largestDistance(dimensions, index), bound };
}

/**
 * The pairs that move the barcode by the largest share of their bound, farther moves first among
 * equals, then by place. O(pairs × most) at worst, one pass.
 * @param values f by arrival position.
 */
export function strongestPairs(
  matrix: SwapMatrix,
  values: Float64Array,
  dimensions: readonly number[],
  most: number,
): readonly Consequence[] {
  const indices = (function* () {
    for (let i = 0; i < matrix.pairCount; i += 1) if (matrix.known[i] === 1) yield i;
  })();
  const byShare = (a: Consequence, b: Consequence): number =>
    share(b) - share(a) || b.distance - a.distance || a.index - b.index;
  return strongest(matrix, values, dimensions, indices, most, byShare);
}

/** The swaps of one node that move the barcode farthest, in the unit of the scale. */
export function strongestOfNode(
  matrix: SwapMatrix,
  values: Float64Array,
  dimensions: readonly number[],
  node: number,
  most: number,
): readonly Consequence[] {
  const indices = (function* () {
    for (let other = 0; other < matrix.nodeCount; other += 1) {
      if (other === node) continue;
      const index = pairIndex(matrix.nodeCount, Math.min(node, other), Math.max(node, other));
      if (matrix.known[index] === 1) yield index;
    }
  })();
  const byDistance = (a: Consequence, b: Consequence): number =>
    b.distance - a.distance || share(b) - share(a) || a.index - b.index;
  return strongest(matrix, values, dimensions, indices, most, byDistance);
}

function strongest(
  matrix: SwapMatrix,
  values: Float64Array,
  dimensions: readonly number[],
  indices: Iterable<number>,
  most: number,
  compare: (a: Consequence, b: Consequence) => number,
): readonly Consequence[] {
  const best: Consequence[] = [];
  for (const index of indices) {
    if (matrix.largestDistance(dimensions, index) === 0) continue;
    const candidate = consequenceOf(matrix, values, dimensions, index);
    const last = best.at(-1);
    if (best.length === most && last !== undefined && compare(candidate, last) >= 0) continue;
    best.push(candidate);
    best.sort(compare);
    if (best.length > most) best.pop();
  }
  return best;
}
