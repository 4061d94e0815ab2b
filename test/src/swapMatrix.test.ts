import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decodeMatrixBlock, encodeMatrixBlock } from '#contract/matrixBytes';
import { filtrationOf, firstPositionAt } from '../../src/graphs/filtration';
import { leewayOf } from '../../src/graphs/leeway';
import { measureField } from '../../src/graphs/measures';
import { orderingOf } from '../../src/graphs/ordering';
import { runSummary } from '../../src/graphs/runSummary';
import { pairAt, pairIndex, pairsOf, SwapMatrix } from '../../src/graphs/swapMatrix';
import { groupFigures, safePairs, swapSafeGraph } from '../../src/graphs/swapSafeGraph';

/** A block of the rows given whose distance in dimension k is `d(k, p, q)` and whose gap is its floor. */
function blockOf(
  n: number,
  rows: number[],
  dims: number,
  d: (k: number, p: number, q: number) => number,
) {
  const pairs = rows.flatMap((p) =>
    Array.from({ length: n - 1 - p }, (_, i): [number, number] => [p, p + 1 + i]),
  );
  const cells = Array.from({ length: dims }, (_, k) => pairs.map(([p, q]) => d(k, p, q))).flat();
  return {
    nodeCount: n,
    rows: Uint32Array.from(rows),
    choice: null,
    pairCount: pairs.length,
    distances: Float64Array.from(cells),
    bettiGaps: Int32Array.from(cells.map(Math.floor)),
  };
}

const byPlace = (k: number, p: number, q: number): number => 1000 * k + 10 * p + q;

describe('pair index', () => {
  it('runs through all pairs once, and pairAt is its inverse', () => {
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 60 }), (n) => {
        let index = 0;
        for (let p = 0; p < n; p += 1) {
          for (let q = p + 1; q < n; q += 1, index += 1) {
            expect(pairIndex(n, p, q)).toBe(index);
            expect(pairAt(n, index)).toEqual({ p, q });
          }
        }
        expect(index).toBe(pairsOf(n));
      }),
      { numRuns: 30 },
    );
  });

  it('is exact at both ends for 5,000 nodes', () => {
    expect(pairAt(5000, pairsOf(5000) - 1)).toEqual({ p: 4998, q: 4999 });
    expect(pairAt(5000, 4998)).toEqual({ p: 0, q: 4999 });
    expect(pairAt(5000, 4999)).toEqual({ p: 1, q: 2 });
  });
});

describe('a matrix filled block by block', () => {
  const n = 6;
  it('holds every pair at its place whatever rows a block has and whatever order blocks land in', () => {
    const matrix = new SwapMatrix(n, 2);
    for (const rows of [
      [4, 1],
      [0, 5],
      [3, 2],
    ]) {
      const bytes = encodeMatrixBlock(blockOf(n, rows, 2, byPlace));
      matrix.place(decodeMatrixBlock(bytes.buffer));
    }
    for (let p = 0; p < n; p += 1) {
      for (let q = p + 1; q < n; q += 1) {
        const index = pairIndex(n, p, q);
        expect(matrix.isKnown(p, q)).toBe(true);
        expect([matrix.distance(0, index), matrix.distance(1, index)]).toEqual([
          byPlace(0, p, q),
          byPlace(1, p, q),
        ]);
        expect(matrix.bettiGap(1, index)).toBe(byPlace(1, p, q));
      }
    }
    expect(matrix.knownCount).toBe(15);
  });

  it('does not count a block twice', () => {
    const matrix = new SwapMatrix(n, 1);
    matrix.place(blockOf(n, [0], 1, byPlace));
    matrix.place(blockOf(n, [0], 1, byPlace));
    expect(matrix.knownCount).toBe(5);
  });

  it('refuses a block of another network', () => {
    expect(() => new SwapMatrix(7, 2).place(blockOf(n, [0], 2, byPlace))).toThrow(RangeError);
    expect(() => new SwapMatrix(6, 1).place(blockOf(n, [0], 2, byPlace))).toThrow(RangeError);
  });
});

describe('arrival order', () => {
  it('breaks ties by node row, and equal entries share a step on scale rank', () => {
    const filtration = filtrationOf([5, 2, 5, 2, 9], 'rank');
    expect([...filtration.order]).toEqual([1, 3, 0, 2, 4]);
    expect([...filtration.values]).toEqual([1, 1, 2, 2, 3]);
    expect([...filtration.position]).toEqual([2, 0, 3, 1, 4]);
    expect([...filtrationOf([5, 2, 5, 2, 9], 'entry').values]).toEqual([2, 2, 5, 5, 9]);
  });

  it('finds the first position with a value', () => {
    const values = Float64Array.of(1, 1, 2, 2, 3);
    expect([0, 1, 2, 2.5, 3, 4].map((v) => firstPositionAt(values, v))).toEqual([0, 0, 2, 4, 4, 5]);
  });
});

/** Distances 0 except between {0,1,2} and {3,4}, where dimension 1 moves by the bound and dimension 2 by 1. */
function twoBlocks(): SwapMatrix {
  const matrix = new SwapMatrix(5, 3);
  const d = (k: number, p: number, q: number): number =>
    p <= 2 && q >= 3 ? ([0, q - p, 1][k] ?? 0) : 0;
  matrix.place(blockOf(5, [0, 1, 2, 3, 4], 3, d));
  return matrix;
}
const steps = Float64Array.of(1, 2, 3, 4, 5);

describe('measures', () => {
  it('give change as a share of the bound, and 0 where every chosen distance is 0', () => {
    const change = measureField(twoBlocks(), steps, 'change', [1, 2]);
    expect([...change.values]).toEqual([0, 0, 1, 1, 0, 1, 1, 1, 1, 0]);
    expect(change.ceiling).toBe(1);
    const two = measureField(twoBlocks(), steps, 'change', [2]);
    expect(two.values[pairIndex(5, 0, 4)]).toBe(1 / 4);
  });

  it('name the dimension that moves most, the lower one of equals', () => {
    const moves = measureField(twoBlocks(), steps, 'moves', [1, 2]);
    expect(moves.values[pairIndex(5, 2, 3)]).toBe(2);
    expect(moves.values[pairIndex(5, 0, 1)]).toBe(0);
  });

  it('are not a number where a pair has not landed, unlike the bound', () => {
    const matrix = new SwapMatrix(3, 1);
    expect([...measureField(matrix, steps, 'change', [0]).values]).toEqual([NaN, NaN, NaN]);
    expect([...measureField(matrix, steps, 'bound', [0]).values]).toEqual([1, 2, 1]);
  });

  it('call a pair with bound 0 unchanged', () => {
    const matrix = new SwapMatrix(2, 1);
    matrix.place(blockOf(2, [0, 1], 1, () => 0));
    expect([...measureField(matrix, Float64Array.of(4, 4), 'change', [0]).values]).toEqual([0]);
  });
});

describe('swap-safe pairs', () => {
  it('bound the leeway of a node on both sides', () => {
    const matrix = twoBlocks();
    expect(leewayOf(matrix, [1, 2], 1)).toEqual({ earlier: 1, later: 1, open: false });
    expect(leewayOf(matrix, [1, 2], 2)).toEqual({ earlier: 2, later: 0, open: false });
    expect(leewayOf(matrix, [0], 2)).toEqual({ earlier: 2, later: 2, open: false });
  });

  it('leave a leeway open at a pair that has not landed', () => {
    const matrix = new SwapMatrix(3, 1);
    matrix.place(blockOf(3, [0], 1, () => 0));
    expect(leewayOf(matrix, [0], 1)).toEqual({ earlier: 1, later: 0, open: true });
  });

  it('make the swap-safe graph', () => {
    const safe = safePairs(twoBlocks(), [1, 2]);
    const graph = swapSafeGraph(5, safe);
    expect([graph.order, graph.size]).toEqual([5, 4]);
    expect(groupFigures(5, safe, [0, 2, 3])).toEqual({ safe: 1, pairs: 3, degrees: 5, edges: 4 });
  });

  it('are counted for the whole run, beside those that move by more than half their bound', () => {
    expect(runSummary(twoBlocks(), steps, [1, 2])).toEqual({ known: 10, safe: 4, overHalf: 6 });
    expect(runSummary(twoBlocks(), steps, [2])).toEqual({ known: 10, safe: 4, overHalf: 1 });
  });
});

describe('orders of the square', () => {
  const input = {
    matrix: twoBlocks(),
    dimensions: [1, 2],
    labels: ['node 10', 'node 9', 'b', 'a', 'c'],
    communities: [
      [3, 4],
      [0, 1, 2],
    ],
  };
  it.each([
    ['arrival', [0, 1, 2, 3, 4]],
    ['label', [3, 2, 4, 1, 0]],
    ['leeway', [0, 1, 2, 3, 4]],
    ['community', [3, 4, 0, 1, 2]],
  ] as const)('by %s', (ordering, expected) => {
    expect([...orderingOf(ordering, input)]).toEqual(expected);
  });
});
