import { UndirectedGraph } from 'graphology';
import louvain from 'graphology-communities-louvain';
import { randomLcg, shuffler } from 'd3';
import { modularityOf } from './modularity';

export interface Partition {
  /** Node keys of every community, largest community first, ties by the first member. */
  readonly communities: readonly (readonly string[])[];
  readonly modularity: number;
}

export interface CommunityOptions {
  /** In [0, 1): the same seed always gives the same partition. */
  readonly seed?: number;
  /** Louvain passes from differently shuffled orders; the best is kept. */
  readonly starts?: number;
}

/** Edges above which fewer starts are made, so that the answer stays within about a second. */
const MANY_EDGES = 20_000;

/**
 * Communities by the Louvain method (Blondel, Guillaume, Lambiotte, Lefebvre, J. Stat. Mech. 2008
 * P10008), unweighted, the best modularity of several seeded starts. A heuristic: a local optimum.
 * Without edges every node is a community of its own and the modularity is 0.
 */
export function communitiesOf(graph: UndirectedGraph, options: CommunityOptions = {}): Partition {
  if (graph.size === 0) return { communities: graph.nodes().map((node) => [node]), modularity: 0 };
  const random = randomLcg(options.seed ?? 0.5);
  const shuffle = shuffler(random);
  const starts = options.starts ?? (graph.size > MANY_EDGES ? 3 : 20);
  let best: Partition | null = null;
  for (let start = 0; start < starts; start += 1) {
    const shuffled = new UndirectedGraph();
    for (const node of shuffle(graph.nodes())) shuffled.addNode(node);
    graph.forEachUndirectedEdge((_, __, a, b) => shuffled.addUndirectedEdge(a, b));
    const found = partitionOf(graph, louvain(shuffled, { rng: random, getEdgeWeight: null }));
    if (best === null || found.modularity > best.modularity + 1e-12) best = found;
  }
  return best ?? { communities: [], modularity: 0 };
}

function partitionOf(graph: UndirectedGraph, community: Record<string, number>): Partition {
  const members = new Map<number, string[]>();
  graph.forEachNode((node) => {
    const label = community[node] ?? -1;
    const list = members.get(label);
    if (list === undefined) members.set(label, [node]);
    else list.push(node);
  });
  const place = new Map(graph.nodes().map((node, index) => [node, index]));
  const first = (list: readonly string[]): number => place.get(list[0] ?? '') ?? 0;
  const communities = [...members.values()].sort(
    (a, b) => b.length - a.length || first(a) - first(b),
  );
  return { communities, modularity: modularityOf(graph, communities) };
}
