import { UndirectedGraph } from 'graphology';
import { pairIndex, type SwapMatrix } from './swapMatrix';

/** 1 by pair index where swapping the two changes no barcode of the chosen dimensions. O(pairs). */
export function safePairs(matrix: SwapMatrix, dimensions: readonly number[]): Uint8Array {
  return Uint8Array.from({ length: matrix.pairCount }, (_, index) =>
    matrix.known[index] === 1 && matrix.largestDistance(dimensions, index) === 0 ? 1 : 0,
  );
}

/**
 * The swap-safe graph: one node per arrival position (key = position as text), an edge for every
 * swap-safe pair. @param safe 1 by pair index.
 */
export function swapSafeGraph(nodeCount: number, safe: Uint8Array): UndirectedGraph {
  const graph = new UndirectedGraph();
  for (let p = 0; p < nodeCount; p += 1) graph.addNode(String(p));
  let index = 0;
  for (let p = 0; p < nodeCount; p += 1) {
    for (let q = p + 1; q < nodeCount; q += 1, index += 1) {
      if (safe[index] === 1) graph.addUndirectedEdge(String(p), String(q));
    }
  }
  return graph;
}

/** What a set of arrival positions is in the swap-safe graph. */
export interface GroupFigures {
  /** Swap-safe pairs inside, of `pairs` among the members. */
  readonly safe: number;
  readonly pairs: number;
  /** Sum of the members' degrees in the whole graph. */
  readonly degrees: number;
  /** Swap-safe pairs of the whole graph. */
  readonly edges: number;
}

/** O(pairs of the matrix). */
export function groupFigures(
  nodeCount: number,
  safe: Uint8Array,
  members: readonly number[],
): GroupFigures {
  const inside = new Uint8Array(nodeCount);
  for (const p of members) inside[p] = 1;
  let within = 0;
  let degrees = 0;
  let edges = 0;
  for (let p = 0; p < nodeCount; p += 1) {
    const row = pairIndex(nodeCount, p, p + 1) - p - 1;
    for (let q = p + 1; q < nodeCount; q += 1) {
      if (safe[row + q] !== 1) continue;
      const ends = (inside[p] ?? 0) + (inside[q] ?? 0);
      edges += 1;
      degrees += ends;
      if (ends === 2) within += 1;
    }
  }
  return { safe: within, pairs: (members.length * (members.length - 1)) / 2, degrees, edges };
}
