import type { UndirectedGraph } from 'graphology';

/**
 * What a set of nodes adds to the modularity Q of an unweighted graph: L/m - (d/2m)², where L edges
 * lie inside the set, d is the sum of its degrees and m the number of edges
 * (Newman, Girvan, Phys. Rev. E 69 (2004) 026113). 0 for a graph without edges.
 */
export function modularityShare(graph: UndirectedGraph, members: Iterable<string>): number {
  const edges = graph.size;
  if (edges === 0) return 0;
  const inside = new Set(members);
  let degrees = 0;
  let ends = 0;
  for (const node of inside) {
    degrees += graph.degree(node);
    graph.forEachNeighbor(node, (neighbour) => {
      if (inside.has(neighbour)) ends += 1;
    });
  }
  return ends / 2 / edges - (degrees / (2 * edges)) ** 2;
}

/** Modularity Q of a partition: the sum of its shares. Between -1/2 and 1. */
export function modularityOf(
  graph: UndirectedGraph,
  partition: readonly (readonly string[])[],
): number {
  return partition.reduce((sum, members) => sum + modularityShare(graph, members), 0);
}
