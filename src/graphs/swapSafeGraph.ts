import { UndirectedGraph } from 'graphology';
import type { SwapMatrix } from './swapMatrix';

/**
 * The swap-safe graph: one node per arrival position (key = position as text), an edge where swapping
 * the two changes no barcode of the chosen dimensions. Pairs that have not landed have no edge.
 */
export function swapSafeGraph(matrix: SwapMatrix, dimensions: readonly number[]): UndirectedGraph {
  const graph = new UndirectedGraph();
  const n = matrix.nodeCount;
  for (let p = 0; p < n; p += 1) graph.addNode(String(p));
  for (let p = 0; p < n; p += 1) {
    for (let q = p + 1; q < n; q += 1) {
      if (matrix.isSafe(dimensions, p, q)) graph.addUndirectedEdge(String(p), String(q));
    }
  }
  return graph;
}

/** Swap-safe pairs among some positions, of all pairs among them. */
export function safePairsInside(
  matrix: SwapMatrix,
  dimensions: readonly number[],
  positions: readonly number[],
): { readonly safe: number; readonly pairs: number } {
  let safe = 0;
  for (let i = 0; i < positions.length; i += 1) {
    for (let j = i + 1; j < positions.length; j += 1) {
      if (matrix.isSafe(dimensions, positions[i] ?? 0, positions[j] ?? 0)) safe += 1;
    }
  }
  return { safe, pairs: (positions.length * (positions.length - 1)) / 2 };
}
