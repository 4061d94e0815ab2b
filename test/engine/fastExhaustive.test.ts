import { expect, it } from 'vitest';
import { networkOf, seeded } from '../support/graphs';
import { disagreements } from './agreement';
import { fastMatrix, randomLabels } from './fastMatrix';

/** Every labelled graph on n nodes, entries 0..n-1. */
function* allGraphs(nodeCount: number) {
  const pairs: [number, number][] = [];
  for (let j = 0; j < nodeCount; j++) for (let i = 0; i < j; i++) pairs.push([i, j]);
  for (let mask = 0; mask < 1 << pairs.length; mask++) {
    yield networkOf(
      nodeCount,
      pairs.filter((_, e) => (mask >> e) % 2 === 1),
    );
  }
}

it.each([0, 1, 2, 3, 4, 5])('all graphs on %i nodes agree with the definition', (nodeCount) => {
  const source = seeded(nodeCount + 1);
  let graph = 0;
  for (const network of allGraphs(nodeCount)) {
    const labels = [randomLabels(nodeCount, source), 'degree', 'position'] as const;
    for (const zeroTests of ['always', 'never'] as const) {
      const { found } = disagreements(network, { labels: labels[graph % 3], zeroTests });
      expect(found).toEqual([]);
    }
    graph++;
  }
});

it('sums over the 10240 swaps of all graphs on 5 nodes are the known ones (published check B4)', () => {
  const sums = [0, 0, 0, 0];
  let [pairs, unchanged] = [0, 0];
  for (const network of allGraphs(5)) {
    const { pairCount, distances } = fastMatrix(network).results;
    for (let i = 0; i < pairCount; i++) {
      const each = sums.map((_, k) => distances[k * pairCount + i]!);
      each.forEach((distance, k) => (sums[k]! += distance));
      pairs++;
      if (each.every((distance) => distance === 0)) unchanged++;
    }
  }
  expect({ pairs, unchanged, sums }).toEqual({
    pairs: 10_240,
    unchanged: 4392,
    sums: [5732, 324, 0, 0],
  });
});
