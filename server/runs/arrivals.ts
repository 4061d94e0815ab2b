/** The order in which nodes arrive: by value, equal values by row. The same for both scales. */
export interface Arrivals {
  /** Node row at each arrival position. */
  readonly rowAt: Uint32Array;
  /** Arrival position of each node row. */
  readonly positionOf: Uint32Array;
}

/** @param entries recorded entries in row order */
export function arrivalsOf(entries: readonly number[]): Arrivals {
  const rowAt = Uint32Array.from(entries.keys()).sort(
    (a, b) => (entries[a] ?? 0) - (entries[b] ?? 0) || a - b,
  );
  const positionOf = new Uint32Array(rowAt.length);
  rowAt.forEach((row, position) => (positionOf[row] = position));
  return { rowAt, positionOf };
}
