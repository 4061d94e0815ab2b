import type { RunPart } from '#contract/enums';
import { pairIndex, pairsOf } from './swapMatrix';

/** What of a node its part is told by, in arrival order. */
export interface ArrivedNode {
  /** Node row. */
  readonly row: number;
  readonly entry: number;
  readonly earliest: number | null;
  readonly latest: number | null;
}

/**
 * Which pairs a run covers: 1 by pair index. The worker lists them by itself; a test holds the two
 * to the same pairs.
 * @param nodes in arrival order
 */
export function partMask(part: RunPart, nodes: readonly ArrivedNode[]): Uint8Array {
  const n = nodes.length;
  const mask = new Uint8Array(pairsOf(n));
  const take = (p: number, q: number): void => {
    if (p !== q) mask[pairIndex(n, Math.min(p, q), Math.max(p, q))] = 1;
  };
  const takeWithin = (from: number, to: number): void => {
    for (let p = from; p <= to; p += 1) for (let q = p + 1; q <= to; q += 1) take(p, q);
  };
  switch (part.kind) {
    case 'whole':
      mask.fill(1);
      break;
    case 'within':
      for (let p = 0; p < n; p += 1) {
        for (let q = p + 1; q <= Math.min(n - 1, p + part.positions); q += 1) take(p, q);
      }
      break;
    case 'overlapping':
      takeOverlaps(nodes, take);
      break;
    case 'chosen': {
      const positionOf = new Map(nodes.map(({ row }, p) => [row, p]));
      const places = (rows: readonly number[]) => rows.flatMap((row) => positionOf.get(row) ?? []);
      for (const [from, to] of part.windows) takeWithin(from, Math.min(to, n - 1));
      for (const p of places(part.nodes)) for (let q = 0; q < n; q += 1) take(p, q);
      for (const pair of part.pairs) {
        const [p, q] = places(pair);
        if (p !== undefined && q !== undefined) take(p, q);
      }
    }
  }
  return mask;
}

/** Closed intervals [earliest ?? entry, latest ?? entry] that neither lies before the other. */
function takeOverlaps(nodes: readonly ArrivedNode[], take: (p: number, q: number) => void): void {
  const starts = nodes.map(({ entry, earliest }) => earliest ?? entry);
  const ends = nodes.map(({ entry, latest }) => latest ?? entry);
  for (let p = 0; p < nodes.length; p += 1) {
    for (let q = p + 1; q < nodes.length; q += 1) {
      const apart = (starts[q] ?? 0) > (ends[p] ?? 0) || (starts[p] ?? 0) > (ends[q] ?? 0);
      if (!apart) take(p, q);
    }
  }
}

/**
 * Which pairs a run covers, by pair index; null where it covers every pair.
 * @param nodes in row order
 */
export function coveredPairs(
  part: RunPart,
  nodes: readonly Omit<ArrivedNode, 'row'>[],
): Uint8Array | null {
  if (part.kind === 'whole') return null;
  const arrived = nodes
    .map(({ entry, earliest, latest }, row) => ({ entry, earliest, latest, row }))
    .sort((a, b) => a.entry - b.entry || a.row - b.row);
  return partMask(part, arrived);
}
