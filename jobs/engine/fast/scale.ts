/** The values of f by arrival position, and their ranks: bars are compared by rank, exactly. */
export interface Scale {
  /** Rank of f at each position: equal values share one. */
  readonly rank: Int32Array;
  /** f by rank, strictly ascending. */
  readonly value: Float64Array;
}

/** `sorted`: f by position, ascending. */
export function makeScale(sorted: Float64Array): Scale {
  const rank = new Int32Array(sorted.length);
  const value: number[] = [];
  for (let p = 0; p < sorted.length; p++) {
    if (p === 0 || sorted[p] !== sorted[p - 1]) value.push(sorted[p]!);
    rank[p] = value.length - 1;
  }
  return { rank, value: Float64Array.from(value) };
}
