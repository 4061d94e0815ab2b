import { UndirectedGraph } from 'graphology';
import { describe, expect, it } from 'vitest';
import { communitiesOf } from '../../src/graphs/communities';
import { modularityOf } from '../../src/graphs/modularity';
import { KARATE_EDGES } from './karate';

type Edge = readonly [number, number];

function graphOf(nodes: number, edges: readonly Edge[]): UndirectedGraph {
  const graph = new UndirectedGraph();
  for (let v = 0; v < nodes; v += 1) graph.addNode(String(v));
  for (const [a, b] of edges) graph.addUndirectedEdge(String(a), String(b));
  return graph;
}

const keys = (partition: readonly (readonly number[])[]): string[][] =>
  partition.map((members) => members.map(String));

const range = (from: number, to: number): number[] =>
  Array.from({ length: to - from }, (_, i) => from + i);

const clique = (members: readonly number[]): Edge[] =>
  members.flatMap((a, i) => members.slice(i + 1).map((b): Edge => [a, b]));

const karate = graphOf(34, KARATE_EDGES);
const BEST_KARATE = 1277 / 3042;

describe("Zachary's karate club, 34 nodes, 78 unweighted edges", () => {
  // Aloise et al., Phys. Rev. E 82 (2010) 046112; Agarwal, Kempe, Eur. Phys. J. B 66 (2008) 409-418 (0.420)
  it('has the published best partition with Q = 1277/3042', () => {
    const best = [
      [0, 1, 2, 3, 7, 11, 12, 13, 17, 19, 21],
      [4, 5, 6, 10, 16],
      [8, 9, 14, 15, 18, 20, 22, 26, 29, 30, 32, 33],
      [23, 24, 25, 27, 28, 31],
    ];
    expect(modularityOf(karate, keys(best))).toBeCloseTo(BEST_KARATE, 12);
  });

  // Blondel, Guillaume, Lambiotte, Lefebvre, J. Stat. Mech. 2008 P10008, Table 1 (karate 0.42)
  it('never gets more than 1277/3042 from Louvain, and at least 0.4188 from the best of 20 starts', () => {
    for (const seed of [0.1, 0.35, 0.5, 0.72, 0.93]) {
      const once = communitiesOf(karate, { seed, starts: 1 });
      const best = communitiesOf(karate, { seed, starts: 20 });
      expect(once.modularity).toBeLessThanOrEqual(BEST_KARATE + 1e-12);
      expect(best.modularity).toBeLessThanOrEqual(BEST_KARATE + 1e-12);
      expect(best.modularity).toBeGreaterThanOrEqual(0.4188 - 5e-5);
    }
  });

  it('gives the same communities for the same seed', () => {
    expect(communitiesOf(karate, { seed: 0.5 })).toEqual(communitiesOf(karate, { seed: 0.5 }));
  });
});

// Fortunato, Barthelemy, PNAS 104 (2007) 36-41: the resolution limit (0.876, 0.888)
describe('a ring of 30 cliques of 5 nodes, neighbours joined by one edge', () => {
  const cliques = range(0, 30).map((c) => range(5 * c, 5 * c + 5));
  const ring = graphOf(150, [
    ...cliques.flatMap(clique),
    ...range(0, 30).map((c): Edge => [5 * c, 5 * ((c + 1) % 30) + 1]),
  ]);

  it('has Q = 289/330 for single cliques and more, 293/330, for pairs of cliques', () => {
    const pairs = range(0, 15).map((c) => [
      ...(cliques[2 * c] ?? []),
      ...(cliques[2 * c + 1] ?? []),
    ]);
    expect(modularityOf(ring, keys(cliques))).toBeCloseTo(289 / 330, 12);
    expect(modularityOf(ring, keys(pairs))).toBeCloseTo(293 / 330, 12);
  });
});

// Newman, Girvan, Phys. Rev. E 69 (2004) 026113 (definition); Brandes et al., IEEE TKDE 20 (2008) 172-188
describe('modularity of fixed partitions', () => {
  const k7 = graphOf(7, clique(range(0, 7)));
  const fours = [range(0, 4), range(4, 8), range(8, 12)];
  const threes = [range(0, 3), range(3, 6)];
  const k33 = threes[0]?.flatMap((a) => (threes[1] ?? []).map((b): Edge => [a, b])) ?? [];

  it.each([
    ['K_7 in one group', k7, [range(0, 7)], 0],
    ['K_7 in singletons', k7, range(0, 7).map((v) => [v]), -1 / 7],
    ['three disjoint K_4 by clique', graphOf(12, fours.flatMap(clique)), fours, 2 / 3],
    ['K_{3,3} by side', graphOf(6, k33), threes, -1 / 2],
    [
      'two K_3 joined by one edge, by clique',
      graphOf(6, [...threes.flatMap(clique), [2, 3]]),
      threes,
      5 / 14,
    ],
  ])('%s', (_, graph, partition, expected) => {
    expect(modularityOf(graph, keys(partition))).toBeCloseTo(expected, 12);
  });
});

describe('a graph without edges', () => {
  it('has modularity 0 and a community for every node', () => {
    expect(communitiesOf(graphOf(3, []))).toEqual({
      communities: [['0'], ['1'], ['2']],
      modularity: 0,
    });
  });
});
