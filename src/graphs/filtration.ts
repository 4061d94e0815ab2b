import type { Scale } from '#contract/enums';

/** How the nodes of a revision stand on the arrival axis. */
export interface Filtration {
  /** Node row at every arrival position 0..n-1. */
  readonly order: Uint32Array;
  /** Arrival position of every node row. */
  readonly position: Uint32Array;
  /** f by arrival position, ascending: the entry itself, or its step 1, 2, … */
  readonly values: Float64Array;
}

/**
 * Sorts nodes by entry, ties by node row, as the matrix does. On scale `rank` equal entries share a
 * step.
 */
export function filtrationOf(entries: readonly number[], scale: Scale): Filtration {
  const n = entries.length;
  const at = (row: number): number => entries[row] ?? 0;
  const order = Uint32Array.from({ length: n }, (_, row) => row).sort(
    (a, b) => at(a) - at(b) || a - b,
  );
  const position = new Uint32Array(n);
  const values = new Float64Array(n);
  let step = 0;
  for (let p = 0; p < n; p += 1) {
    const row = order[p] ?? 0;
    position[row] = p;
    if (p === 0 || at(row) !== at(order[p - 1] ?? 0)) step += 1;
    values[p] = scale === 'rank' ? step : at(row);
  }
  return { order, position, values };
}

/** @returns the first arrival position whose f is at least `value`; n if there is none. O(log n). */
export function firstPositionAt(values: Float64Array, value: number): number {
  let low = 0;
  let high = values.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if ((values[middle] ?? 0) < value) low = middle + 1;
    else high = middle;
  }
  return low;
}
