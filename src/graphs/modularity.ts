import type { UndirectedGraph } from 'graphology';

/**
 * The term L/m - (d/2m)² of one community: L edges inside, d the sum of its degrees, m edges in all
 * (Newman, Girvan, Phys. Rev. E 69 (2004) 026113). 0 for a graph without edges.
 */
export const modularityTerm = (inside: number, degrees: number, edges: number): number =>
  edges === 0 ? 0 : inside / edges - (degrees / (2 * edges)) ** 2;

/**
 * What a set of nodes adds to the modularity Q of an unweighted graph (see `modularityTerm`).
 */
export function modularityShare(graph: UndirectedGraph, members: Iterable<string>): number {
  const inside = new Set(members);
  let degrees = 0;
  let ends = 0;
  for (const node of inside) {
    degrees += graph.degree(node);
    graph.forEachNeighbor(node, (neighbour) => {
      if (inside.has(neighbour)) ends += 1;
    });
  }
  return modularityTerm(ends / 2, degrees, graph.size);
}

/** Modularity Q of a partition: the sum of its shares. Between -1/2 and 1. */
export function modularityOf(
  graph: UndirectedGraph,
  partition: readonly (readonly string[])[],
): number {
  return partition.reduce((sum, members) => sum + modularityShare(graph, members), 0);
}
