import { describe, expect, test } from 'vitest';
import { bottleneckDistance } from '../../jobs/engine/bottleneck';
import type { Network } from '../../jobs/engine/types';
import { networkOf, randomNetwork, MODELS } from '../support/graphs';
import { completeMultipartite, graphWhere, labelledGraphs } from './families';
import { barcodeOf, pairsOf, preparedOf, spelled, wholeMatrix } from './reading';

/** All orders of a list. */
function orders<T>(list: readonly T[]): T[][] {
  if (list.length <= 1) return [[...list]];
  return list.flatMap((first, k) =>
    orders(list.filter((_, at) => at !== k)).map((rest) => [first, ...rest]),
  );
}

/** The graph with the entries of `nodes` dealt anew in the given order. */
function shuffled(graph: Network, nodes: readonly number[], entries: readonly number[]): Network {
  const values = graph.values.slice();
  nodes.forEach((node, k) => (values[node] = entries[k]!));
  return { ...graph, values };
}

/** Entries of the orders of the nodes that change the barcode. */
function breaking(graph: Network, nodes: readonly number[]): number[][] {
  const recorded = spelled(barcodeOf(graph));
  return orders(nodes.map((node) => graph.values[node]!)).filter(
    (entries) => spelled(barcodeOf(shuffled(graph, nodes, entries))) !== recorded,
  );
}

describe('pairwise safety does not prove that a group may be shuffled', () => {
  // Found by exhaustive search for these checks; not published.
  test('the smallest case: K_4 without one edge, four of its 24 orders', () => {
    const graph = networkOf(4, [
      [0, 1],
      [0, 2],
      [0, 3],
      [1, 2],
      [1, 3],
    ]);
    expect(barcodeOf(graph).map(pairsOf)).toEqual([[[0, Infinity]], [], [], []]);
    expect(
      wholeMatrix(graph)
        .flat()
        .every((d) => d === 0),
    ).toBe(true);
    const broken = breaking(graph, [0, 1, 2, 3]);
    expect(broken.sort()).toEqual([
      [2, 3, 0, 1],
      [2, 3, 1, 0],
      [3, 2, 0, 1],
      [3, 2, 1, 0],
    ]);
    const changed = barcodeOf(shuffled(graph, [0, 1, 2, 3], [2, 3, 0, 1]));
    expect(pairsOf(changed[0]!)).toEqual([
      [0, Infinity],
      [1, 2],
    ]);
    expect(bottleneckDistance(barcodeOf(graph)[0]!, changed[0]!)).toBe(0.5);
  });

  test('the octahedron, where only H_1 changes', () => {
    const graph = graphWhere(6, (u, v) => !['0,4', '1,5', '2,3'].includes(`${u},${v}`));
    const nodes = [2, 3, 4, 5];
    expect(barcodeOf(graph).map(pairsOf)).toEqual([[[0, Infinity]], [], [[5, Infinity]], []]);
    const prepared = wholeMatrix(graph);
    let pair = 0;
    for (let p = 0; p < 6; p++) {
      for (let q = p + 1; q < 6; q++, pair++)
        if (p >= 2) expect(prepared[pair]).toEqual([0, 0, 0, 0]);
    }
    expect(breaking(graph, nodes).sort()).toEqual([
      [4, 5, 2, 3],
      [4, 5, 3, 2],
      [5, 4, 2, 3],
      [5, 4, 3, 2],
    ]);
    expect(pairsOf(barcodeOf(shuffled(graph, nodes, [4, 5, 2, 3]))[1]!)).toEqual([[3, 4]]);
  });

  // Arithmetic: (19/23)^N, 4 of the 23 other orders being broken.
  test.each([
    [10, 0.148],
    [20, 0.0219],
    [30, 0.0032],
  ])('%i drawn orders miss it with chance %f', (draws, chance) => {
    const orderCount = 24;
    const broken = breaking(
      networkOf(4, [
        [0, 1],
        [0, 2],
        [0, 3],
        [1, 2],
        [1, 3],
      ]),
      [0, 1, 2, 3],
    ).length;
    const missed = (1 - broken / (orderCount - 1)) ** draws;
    expect(Math.abs(missed - chance)).toBeLessThan(0.00006);
  });
});

// No proof is claimed: a regression check of an exhaustive search.
test('three nodes of any graph on five: pairwise safe means safe in all six orders', () => {
  let groups = 0;
  const graphs = [...labelledGraphs(5)].filter((_, k) => k % 4 === 1);
  for (const model of MODELS)
    for (let seed = 0; seed < 10; seed++) graphs.push(randomNetwork(model, 9, seed));
  for (const graph of graphs) {
    const n = graph.nodeCount;
    const safe = safePairs(graph);
    for (let a = 0; a < n; a++) {
      for (let b = a + 1; b < n; b++) {
        for (let c = b + 1; c < n; c++) {
          if (!(safe(a, b) && safe(a, c) && safe(b, c))) continue;
          groups++;
          expect(breaking(graph, [a, b, c])).toEqual([]);
        }
      }
    }
  }
  expect(groups).toBeGreaterThan(1000);
});

function safePairs(graph: Network): (a: number, b: number) => boolean {
  const n = graph.nodeCount;
  const matrix = wholeMatrix(graph);
  const safe = new Set<number>();
  let pair = 0;
  for (let p = 0; p < n; p++) {
    for (let q = p + 1; q < n; q++, pair++)
      if (matrix[pair]!.every((d) => d === 0)) safe.add(p * n + q);
  }
  return (a, b) => safe.has(a * n + b);
}

test('the parts of a complete multipartite graph may be shuffled freely', () => {
  const graph = completeMultipartite([3, 3]);
  expect(preparedOf(graph).nodeCount).toBe(6);
  expect(breaking(graph, [0, 1, 2])).toEqual([]);
});
