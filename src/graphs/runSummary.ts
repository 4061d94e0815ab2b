import type { SwapMatrix } from './swapMatrix';

export interface RunSummary {
  readonly known: number;
  readonly safe: number;
  /** Pairs that move the barcode by more than half their bound. */
  readonly overHalf: number;
}

/** Counts over the pairs that have landed. @param values f by arrival position. O(pairs). */
export function runSummary(
  matrix: SwapMatrix,
  values: Float64Array,
  dimensions: readonly number[],
): RunSummary {
  let safe = 0;
  let overHalf = 0;
  let index = 0;
  for (let p = 0; p < matrix.nodeCount; p += 1) {
    for (let q = p + 1; q < matrix.nodeCount; q += 1, index += 1) {
      if (matrix.known[index] === 0) continue;
      const distance = matrix.largestDistance(dimensions, index);
      if (distance === 0) safe += 1;
      else if (2 * distance > (values[q] ?? 0) - (values[p] ?? 0)) overHalf += 1;
    }
  }
  return { known: matrix.knownCount, safe, overHalf };
}
