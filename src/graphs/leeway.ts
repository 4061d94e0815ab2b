import type { SwapMatrix } from './swapMatrix';

/** How many arrival positions a node may slip and stay swap-safe with every node on the way. */
export interface Leeway {
  readonly earlier: number;
  readonly later: number;
  /** The count ended at a pair that has not landed, so that the true leeway may be larger. */
  readonly open: boolean;
}

/** Leeway of the node at position p over the chosen dimensions. O(leeway). */
export function leewayOf(matrix: SwapMatrix, dimensions: readonly number[], p: number): Leeway {
  const n = matrix.nodeCount;
  let open = false;
  const reach = (step: 1 | -1): number => {
    let count = 0;
    for (let q = p + step; q >= 0 && q < n; q += step) {
      if (!matrix.isSafe(dimensions, p, q)) {
        open ||= !matrix.isKnown(Math.min(p, q), Math.max(p, q));
        break;
      }
      count += 1;
    }
    return count;
  };
  const earlier = reach(-1);
  const later = reach(1);
  return { earlier, later, open };
}

/** Total leeway (earlier + later) of every position. */
export function leewayByPosition(matrix: SwapMatrix, dimensions: readonly number[]): Uint32Array {
  const total = new Uint32Array(matrix.nodeCount);
  for (let p = 0; p < matrix.nodeCount; p += 1) {
    const { earlier, later } = leewayOf(matrix, dimensions, p);
    total[p] = earlier + later;
  }
  return total;
}
