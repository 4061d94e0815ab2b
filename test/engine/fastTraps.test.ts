import { describe, expect, it } from 'vitest';
import { networkOf, seeded } from '../support/graphs';
import { disagreements } from './agreement';
import { arrival, fastMatrix, foundationOf, randomLabels, type Options } from './fastMatrix';

/** Every graph on 4 nodes and 300 on 5..7, each under three label orders, with strict entries. */
function* smallGraphs() {
  const source = seeded(11);
  for (let graph = 0; graph < 364; graph++) {
    const nodeCount = graph < 64 ? 4 : source.integer(5, 7);
    const edges: [number, number][] = [];
    for (let j = 0, e = 0; j < nodeCount; j++) {
      for (let i = 0; i < j; i++, e++) {
        if (graph < 64 ? (graph >> e) % 2 === 1 : source.real() < 0.6) edges.push([i, j]);
      }
    }
    const network = networkOf(nodeCount, edges);
    for (const labels of ['degree', 'position', randomLabels(nodeCount, source)] as const) {
      yield { network, options: { labels, maxDimension: graph % 4 } satisfies Options };
    }
  }
}

/** Checks the graphs in which `shows` holds, and that there are some. */
function agreeWhere(shows: (foundation: ReturnType<typeof foundationOf>) => boolean) {
  let shown = 0;
  for (const { network, options } of smallGraphs()) {
    if (!shows(foundationOf(network, options))) continue;
    shown++;
    expect(disagreements(network, options).found).toEqual([]);
  }
  expect(shown).toBeGreaterThan(10);
}

describe('what a swap may not overlook', () => {
  it('a comes back with b in its link, at the position b leaves', () => {
    agreeWhere(({ tables }) =>
      tables.starColumns.some(
        (columns, d) =>
          d > 0 &&
          columns.free.latest.some((latest, c) => c >= 0 && latest === tables.nodeCount - 1),
      ),
    );
  });

  it('a row of the star of b is paired with its second union where the first one adds a', () => {
    agreeWhere(({ tables }) =>
      tables.stars.some((star) => star.secondUnion.some((union) => union >= 0)),
    );
  });

  it('a column whose only union adds a is critical in the swap with a', () => {
    agreeWhere(({ tables }) =>
      tables.starColumns.some((columns) => columns?.singleNode.length > 0),
    );
  });

  it('a second union becomes the first where the first one adds a', () => {
    agreeWhere(({ tables }) =>
      tables.starColumns.some((columns) => columns?.free.elder.some((elder) => elder >= 0)),
    );
  });

  it('a child in the dimension above the last needs a lower label, not only an earlier node', () => {
    agreeWhere(({ tables }) => {
      const { nodes, childCount } = tables.levels[tables.top]!;
      const { start, items } = tables.neighbours;
      const width = tables.top + 1;
      return childCount.some((children, s) => {
        const own = nodes.subarray(s * width, (s + 1) * width);
        const common = [...items.subarray(start[own[0]!], start[own[0]! + 1])].filter(
          (u) =>
            u < own[0]! && own.every((v) => items.subarray(start[v], start[v + 1]).includes(u)),
        );
        return children === 0 && common.length > 0;
      });
    });
  });
});

describe('known small swaps', () => {
  it('equal neighbourhoods do not make two nodes safe unless they are adjacent', () => {
    const { results } = fastMatrix(
      networkOf(5, [
        [0, 4],
        [1, 4],
      ]),
    );
    // Pair (0, 2) is the second of the row of 0.
    expect(results.distances[1]).toBe(1);
  });

  it('a column of M before q holds its row; one at q or later leaves it to the stars', () => {
    // Swap 0 and 2: the class born at 2 dies at 3 by an edge that only b's new place explains.
    const network = networkOf(
      4,
      [
        [0, 3],
        [1, 3],
      ],
      [-7, -6, -3, 2],
    );
    expect(disagreements(network, { labels: 'position' }).found).toEqual([]);
    expect(fastMatrix(network).results.distances[1]).toBe(3);
  });

  it('a column after q looks for another row where a star has taken its own', () => {
    const network = networkOf(5, [
      [2, 3],
      [0, 4],
      [2, 4],
      [3, 4],
    ]);
    expect(disagreements(network, { labels: 'degree', maxDimension: 1 }).found).toEqual([]);
  });

  it('a bar of M becomes an infinite class in between and is not lost by subtraction', () => {
    let evicted = 0;
    for (const { network, options } of smallGraphs()) {
      const { recorded, swapped } = fastMatrix(network, options);
      for (const barcode of swapped) {
        barcode.forEach((bars, k) => {
          const infinite = bars.deaths.filter((death) => death === Infinity).length;
          const before = recorded[k]!.deaths.filter((death) => death === Infinity).length;
          expect(infinite).toBe(before);
          if (bars.births.length !== recorded[k]!.births.length) evicted++;
        });
      }
    }
    expect(evicted).toBeGreaterThan(100);
  });

  it('twins of the whole graph trade places without any change (published check D3)', () => {
    let twins = 0;
    for (const { network, options } of smallGraphs()) {
      const neighbours = Array.from({ length: network.nodeCount }, () => new Set<number>());
      const { ends } = arrival(network);
      for (let e = 0; e < ends.length; e += 2) {
        neighbours[ends[e]!]!.add(ends[e + 1]!);
        neighbours[ends[e + 1]!]!.add(ends[e]!);
      }
      const others = (v: number, not: number) =>
        [...neighbours[v]!].filter((u) => u !== not).sort((x, y) => x - y);
      const { pairCount, distances, bettiGaps } = fastMatrix(network, options).results;
      let pair = 0;
      for (let p = 0; p < network.nodeCount; p++) {
        for (let q = p + 1; q < network.nodeCount; q++, pair++) {
          if (others(p, q).join() !== others(q, p).join()) continue;
          twins++;
          for (let i = pair; i < distances.length; i += pairCount) {
            expect([distances[i], bettiGaps[i]]).toEqual([0, 0]);
          }
        }
      }
    }
    expect(twins).toBeGreaterThan(100);
  });

  it('the Betti curves of both orders end alike: the final complex is the same', () => {
    const network = networkOf(4, [
      [0, 1],
      [0, 2],
      [0, 3],
      [1, 2],
      [1, 3],
    ]);
    const { swapped, recorded, results } = fastMatrix(network);
    // Published check H1: none of the six swaps changes the barcode.
    for (const barcode of swapped) expect(barcode).toEqual(recorded);
    expect(results.distances.every((distance) => distance === 0)).toBe(true);
  });
});
