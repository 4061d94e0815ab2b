import { describe, expect, test } from 'vitest';
import { countCliques } from '../../jobs/engine/cliques';
import { arrivalOrder, orderGraph } from '../../jobs/engine/graph';
import type { Barcode, Network } from '../../jobs/engine/types';
import { constantProbability, seeded } from '../support/graphs';
import { edgeTest, graphWhere, labelledGraphs } from './families';
import { barcodeOf, bettiNumbers, spelled, wholeMatrix } from './reading';

const alternating = (numbers: readonly number[]) =>
  numbers.reduce((sum, one, k) => sum + (k % 2 === 0 ? one : -one), 0);

function binomial(n: number, k: number): number {
  let value = 1;
  for (let i = 0; i < k; i++) value = (value * (n - i)) / (i + 1);
  return value;
}

/** E chi of G(n, p) = sum over k of (-1)^(k-1) C(n,k) p^C(k,2) (linearity; Kahle 2009). */
function expectedEuler(n: number, p: number): number {
  let sum = 0;
  for (let k = 1; k <= n; k++) sum -= (-1) ** k * binomial(n, k) * p ** binomial(k, 2);
  return sum;
}

describe('all labelled graphs on n nodes', () => {
  // Linearity; Kahle 2009 (from memory).
  test.each([
    [3, 13 / 8],
    [4, 95 / 64],
    [5, 1201 / 1024],
  ])('n = %i: the mean Euler characteristic is %f', (n, mean) => {
    const values = [...labelledGraphs(n)].map((graph) => alternating(bettiNumbers(graph)));
    expect(values.reduce((sum, one) => sum + one, 0) / values.length).toBe(mean);
  });

  // OEIS A001187; Harary, Palmer, Graphical Enumeration 1973 (from memory).
  test.each([
    [3, 4],
    [4, 38],
    [5, 728],
  ])('n = %i: %i are connected', (n, connected) => {
    expect([...labelledGraphs(n)].filter((graph) => bettiNumbers(graph)[0] === 1)).toHaveLength(
      connected,
    );
  });

  // Not published: computed independently with GUDHI 3.7.1 for these checks.
  test.each([
    [4, [98, 3], 17],
    [5, [1398, 197], 80],
  ])('n = %i: sums of b0 and b1 are %j, and there are %i barcodes', (n, sums, distinct) => {
    const graphs = [...labelledGraphs(n)];
    const betti = graphs.map(bettiNumbers);
    expect([0, 1].map((k) => betti.reduce((sum, one) => sum + one[k]!, 0))).toEqual(sums);
    expect(new Set(graphs.map((graph) => spelled(barcodeOf(graph)))).size).toBe(distinct);
  });

  test('n = 6: there are 512 barcodes', () => {
    const found = new Set<string>();
    for (const graph of labelledGraphs(6)) found.add(spelled(barcodeOf(graph)));
    expect(found.size).toBe(512);
  });
});

describe('all swaps of all labelled graphs on 5 nodes', () => {
  const graphs = [...labelledGraphs(5)];
  const matrices = graphs.map((graph) => wholeMatrix(graph));
  const PAIRS = [0, 1, 2, 3].flatMap((p) =>
    Array.from({ length: 4 - p }, (_, k) => [p, p + 1 + k] as const),
  );

  // Not published: computed independently with GUDHI 3.7.1 for these checks, infinite bars matched
  // among themselves.
  test('4392 of 10240 are swap-safe; the distances sum to 5732, 324, 0 and 0', () => {
    const pairs = matrices.flat();
    expect(pairs).toHaveLength(10240);
    expect(pairs.filter((distances) => distances.every((d) => d === 0))).toHaveLength(4392);
    expect(
      [0, 1, 2, 3].map((k) => pairs.reduce((sum, distances) => sum + distances[k]!, 0)),
    ).toEqual([5732, 324, 0, 0]);
    expect(pairs.flat().every((d) => Number.isInteger(2 * d))).toBe(true);
  });

  // Cohen-Steiner, Edelsbrunner, Harer, Discrete Comput. Geom. 37 (2007) 103-120, Main Theorem (from
  // memory); Cohen-Steiner, Edelsbrunner, Morozov, SoCG 2006 for neighbours.
  test('no distance passes the bound, and neighbours move by 0, 1/2 or 1: 2502, 502 and 1092 times', () => {
    const counts = new Map<number, number>();
    for (const matrix of matrices) {
      matrix.forEach((distances, i) => {
        const [p, q] = PAIRS[i]!;
        const largest = Math.max(...distances);
        expect(largest).toBeLessThanOrEqual(q - p);
        if (q - p === 1) counts.set(largest, (counts.get(largest) ?? 0) + 1);
      });
    }
    expect([...counts].sort(([x], [y]) => x - y)).toEqual([
      [0, 2502],
      [0.5, 502],
      [1, 1092],
    ]);
  });

  test('swapping twins leaves every barcode unchanged: 1280 pairs', () => {
    let twins = 0;
    graphs.forEach((graph, g) => {
      const joined = edgeTest(graph);
      PAIRS.forEach(([p, q], i) => {
        const others = [0, 1, 2, 3, 4].filter((v) => v !== p && v !== q);
        if (!others.every((v) => joined(p, v) === joined(q, v))) return;
        twins++;
        expect(matrices[g]![i]).toEqual([0, 0, 0, 0]);
      });
    });
    expect(twins).toBe(1280);
  });
});

describe('identities at every step of every labelled graph on 5 nodes', () => {
  const upTo = (graph: Network, t: number): Network => {
    const edges: number[] = [];
    for (let e = 0; e < graph.edges.length; e += 2) {
      if (Math.max(graph.edges[e]!, graph.edges[e + 1]!) <= t)
        edges.push(graph.edges[e]!, graph.edges[e + 1]!);
    }
    return {
      nodeCount: t + 1,
      edges: Uint32Array.from(edges),
      values: graph.values.slice(0, t + 1),
    };
  };
  const cliquesBySize = (graph: Network) => [
    ...countCliques(orderGraph(graph, arrivalOrder(graph.values)), 5, 1e6).bySize,
  ];
  const alive = (barcode: Barcode, t: number) =>
    barcode.map(
      ({ births, deaths }) => births.filter((birth, k) => birth <= t && t < deaths[k]!).length,
    );

  // Euler-Poincare: Hatcher 2002, Thm 2.44 (from memory).
  test('the alternating number of bars alive is the Euler characteristic', () => {
    for (const graph of labelledGraphs(5)) {
      const barcode = barcodeOf(graph);
      for (let t = 0; t < 5; t++) {
        expect(alternating(alive(barcode, t))).toBe(alternating(cliquesBySize(upTo(graph, t))));
      }
    }
  });

  // Elder rule (Edelsbrunner, Harer 2010, ch. VII.1; from memory).
  test('there are as many H_0 bars as nodes without an earlier neighbour', () => {
    for (const graph of labelledGraphs(5)) {
      const joined = edgeTest(graph);
      const first = [0, 1, 2, 3, 4].filter(
        (v) => !Array.from({ length: v }, (_, u) => u).some((u) => joined(u, v)),
      );
      expect(barcodeOf(graph, 0)[0]!.births).toHaveLength(first.length);
    }
  });

  // Barmak, Minian, Strong homotopy types, Discrete Comput. Geom. 47 (2012) 301-328 (from memory).
  test('no bar starts or ends at a node dominated by an earlier neighbour', () => {
    for (const graph of labelledGraphs(5)) {
      const joined = edgeTest(graph);
      const ends = barcodeOf(graph).flatMap(({ births, deaths }) => [...births, ...deaths]);
      for (let v = 1; v < 5; v++) {
        const earlier = Array.from({ length: v }, (_, u) => u).filter((u) => joined(u, v));
        const dominated = earlier.some((u) => earlier.every((w) => w === u || joined(u, w)));
        if (dominated) expect(ends).not.toContain(v);
      }
    }
  });
});

describe('random graphs', () => {
  // Exact arithmetic of the formula.
  test.each([
    [10, 1 / 2, -0.541507888],
    [20, 3 / 10, -9.661010783],
    [30, 1 / 5, -26.259346838],
  ])('E chi of G(%i, %f) is %f', (n, p, value) => {
    expect(expectedEuler(n, p)).toBeCloseTo(value, 9);
  });

  test('the mean Euler characteristic of 4000 graphs G(10, 1/2) lies within five standard errors', () => {
    // One stream for all graphs: the first numbers of neighbouring seeds are not independent.
    const source = seeded(1);
    const values = Array.from({ length: 4000 }, () =>
      alternating(
        cliques(
          graphWhere(10, () => source.real() < 0.5),
          10,
        ),
      ),
    );
    const mean = values.reduce((sum, one) => sum + one, 0) / values.length;
    const variance = values.reduce((sum, one) => sum + (one - mean) ** 2, 0) / values.length;
    expect(Math.abs(mean - expectedEuler(10, 0.5))).toBeLessThan(
      5 * Math.sqrt(variance / values.length),
    );
  });

  // Morse inequalities, as used in Kahle 2009 (from memory).
  test('b_k lies between f_k - f_(k-1) - f_(k+1) and f_k', () => {
    for (let seed = 0; seed < 40; seed++) {
      const graph = constantProbability(30, 0.1 + 0.015 * seed, seed);
      const f = cliques(graph);
      bettiNumbers(graph).forEach((b, k) => {
        expect(b).toBeLessThanOrEqual(f[k]!);
        expect(b).toBeGreaterThanOrEqual(f[k]! - (f[k - 1] ?? 0) - (f[k + 1] ?? 0));
      });
    }
  });
});

function cliques(graph: Network, most = 6): number[] {
  return [...countCliques(orderGraph(graph, arrivalOrder(graph.values)), most, 1e7).bySize];
}
