import type { SwapMatrix } from './swapMatrix';

/** What a cell of the matrix can show. */
export const MEASURES = ['change', 'distance', 'betti', 'moves', 'bound'] as const;
export type Measure = (typeof MEASURES)[number];

/** The value of a pair that the run does not cover: below every other, so that no threshold takes it. */
export const OUTSIDE = -Infinity;

/** One value per pair, in the order of `pairIndex`. */
export interface MeasureField {
  readonly measure: Measure;
  /** The dimensions the values were taken over. */
  readonly dimensions: readonly number[];
  /** NaN where the pair has not landed, OUTSIDE where the run does not cover it, 0 where nothing changes. `moves`: dimension + 1. */
  readonly values: Float64Array;
  /** Upper end of the colour ramp: 1 for `change`, else the largest value; at least the least positive. */
  readonly ceiling: number;
}

/** Similarity of a pair: 1 - largest chosen distance / bound; 1 where the bound is 0. */
export const similarityOf = (distance: number, bound: number): number =>
  bound === 0 ? 1 : 1 - distance / bound;

/** @returns the dimension with the largest distance (the lowest of equals), or -1 if all are 0. */
export function dimensionThatMovesMost(
  matrix: SwapMatrix,
  dimensions: readonly number[],
  index: number,
): number {
  let most = 0;
  let found = -1;
  for (const k of dimensions) {
    const distance = matrix.distance(k, index);
    if (distance > most) {
      most = distance;
      found = k;
    }
  }
  return found;
}

/**
 * Computes a measure for every pair that has landed. O(pairs × dimensions).
 * @param values f by arrival position.
 */
export function measureField(
  matrix: SwapMatrix,
  values: Float64Array,
  measure: Measure,
  dimensions: readonly number[],
): MeasureField {
  const n = matrix.nodeCount;
  const field = new Float64Array(matrix.pairCount);
  let largest = 0;
  let index = 0;
  for (let p = 0; p < n; p += 1) {
    for (let q = p + 1; q < n; q += 1, index += 1) {
      const bound = (values[q] ?? 0) - (values[p] ?? 0);
      const value =
        matrix.known[index] === 0 && measure !== 'bound'
          ? matrix.covers(index)
            ? NaN
            : OUTSIDE
          : valueOf(matrix, measure, dimensions, index, bound);
      field[index] = value;
      if (value > largest) largest = value;
    }
  }
  return { measure, dimensions, values: field, ceiling: measure === 'change' ? 1 : largest || 1 };
}

function valueOf(
  matrix: SwapMatrix,
  measure: Measure,
  dimensions: readonly number[],
  index: number,
  bound: number,
): number {
  switch (measure) {
    case 'change':
      return 1 - similarityOf(matrix.largestDistance(dimensions, index), bound);
    case 'distance':
      return matrix.largestDistance(dimensions, index);
    case 'betti':
      return matrix.largestBettiGap(dimensions, index);
    case 'moves':
      return dimensionThatMovesMost(matrix, dimensions, index) + 1;
    case 'bound':
      return bound;
  }
}
