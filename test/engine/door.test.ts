import { describe, expect, test } from 'vitest';
import {
  arrivalOrder,
  computeRows,
  estimate,
  planBlocks,
  prepare,
  recordedBarcode,
  similarity,
  swapDetail,
} from '../../jobs/engine/index';
import {
  EngineInputError,
  EngineLimitError,
  EngineStopped,
  type Network,
} from '../../jobs/engine/types';
import { AMPLE, QUIET } from './fastMatrix';

/** A network by node rows, edges as pairs. */
function network(values: number[], edges: [number, number][]): Network {
  return {
    nodeCount: values.length,
    edges: Uint32Array.from(edges.flat()),
    values: Float64Array.from(values),
  };
}

function complete(n: number): Network {
  const edges: [number, number][] = [];
  for (let u = 0; u < n; u++) for (let v = u + 1; v < n; v++) edges.push([u, v]);
  return network(
    Array.from({ length: n }, (_, v) => v),
    edges,
  );
}

/** Hexagon whose nodes arrive out of order, with a chord and a triangle on it. */
const HEXAGON = network(
  [0, 3, 1, 4, 2, 5, 6],
  [
    [0, 1],
    [1, 2],
    [2, 3],
    [3, 4],
    [4, 5],
    [5, 0],
    [0, 6],
    [1, 6],
  ],
);

describe('a swap in full agrees with the matrix', () => {
  test('its distances, gaps and matching costs are those of the pair', () => {
    const prepared = prepare(HEXAGON, 3, AMPLE, QUIET);
    const n = HEXAGON.nodeCount;
    const { distances, bettiGaps, pairCount } = computeRows(
      prepared,
      Uint32Array.from({ length: n }, (_, p) => p),
      QUIET,
    );
    let pair = 0;
    for (let p = 0; p < n; p++) {
      for (let q = p + 1; q < n; q++, pair++) {
        const detail = swapDetail(prepared, p, q);
        for (let k = 0; k <= 3; k++) {
          expect(detail.distances[k]).toBe(distances[k * pairCount + pair]);
          expect(detail.bettiGaps[k]).toBe(bettiGaps[k * pairCount + pair]);
          const costs = detail.matchings[k]!.map(({ cost }) => cost);
          expect(Math.max(0, ...costs)).toBe(detail.distances[k]);
          const realising = detail.realising[k]!;
          expect(realising === -1 ? 0 : costs[realising]).toBe(detail.distances[k]);
        }
      }
    }
  });

  test('the recorded barcode of a swap in full is the recorded barcode', () => {
    const prepared = prepare(HEXAGON, 2, AMPLE, QUIET);
    expect(swapDetail(prepared, 0, 6).recorded).toEqual(recordedBarcode(prepared));
    expect(() => swapDetail(prepared, 3, 3)).toThrow(EngineInputError);
    expect(() => swapDetail(prepared, 0, 7)).toThrow(EngineInputError);
  });
});

describe('blocks', () => {
  test('every row with a later partner stands in exactly one block, whatever the block size', () => {
    const prepared = prepare(complete(20), 2, AMPLE, QUIET);
    for (const seconds of [1e-9, 1e-5, 1, 1000]) {
      const rows = planBlocks(prepared, seconds).flatMap((block) => [...block]);
      expect(rows.sort((p, q) => p - q)).toEqual(Array.from({ length: 19 }, (_, p) => p));
    }
  });

  test('rows computed in blocks are the rows computed at once', () => {
    const prepared = prepare(HEXAGON, 3, AMPLE, QUIET);
    const whole = computeRows(prepared, Uint32Array.from([0, 1, 2, 3, 4, 5]), QUIET);
    const parts = [
      [4, 1],
      [0, 5],
      [3, 2],
    ].map((rows) => computeRows(prepared, Uint32Array.from(rows), QUIET));
    const of = ({ rows, pairCount, distances }: typeof whole, p: number) => {
      let at = 0;
      for (const row of rows) {
        if (row === p) break;
        at += HEXAGON.nodeCount - 1 - row;
      }
      return [0, 1, 2, 3].map((k) => [
        ...distances.slice(k * pairCount + at, k * pairCount + at + HEXAGON.nodeCount - 1 - p),
      ]);
    };
    for (let p = 0; p < 6; p++) {
      const part = parts.find(({ rows }) => rows.includes(p))!;
      expect(of(part, p)).toEqual(of(whole, p));
    }
  });

  test('a network without pairs has no blocks', () => {
    for (const n of [0, 1])
      expect(planBlocks(prepare(complete(n), 3, AMPLE, QUIET), 1)).toEqual([]);
  });
});

describe('the door refuses what the engine cannot trust', () => {
  test.each([
    ['a self loop', network([0, 1], [[1, 1]]), /row 1 to itself/],
    [
      'an edge given twice',
      network(
        [0, 1],
        [
          [0, 1],
          [1, 0],
        ],
      ),
      /more than once/,
    ],
    ['an edge to nowhere', network([0, 1], [[0, 2]]), /2 nodes/],
    ['a value that is not finite', network([0, NaN], []), /row 1 is NaN/],
    ['values too far apart to subtract', network([-1.7e308, 1.7e308], []), /too far apart/],
  ])('%s', (_, wrong, message) => {
    expect(() => prepare(wrong, 1, AMPLE, QUIET)).toThrow(EngineInputError);
    expect(() => prepare(wrong, 1, AMPLE, QUIET)).toThrow(message);
  });

  test('a dimension outside 0..3', () => {
    for (const dimension of [-1, 4, 1.5])
      expect(() => prepare(HEXAGON, dimension, AMPLE, QUIET)).toThrow(EngineInputError);
  });

  test('a clique bomb fails with the number that broke the limit', () => {
    const limits = { simplices: 100_000, bytes: 2 ** 30 };
    expect(() => prepare(complete(500), 3, limits, QUIET)).toThrow(EngineLimitError);
    expect(() => prepare(complete(500), 3, limits, QUIET)).toThrow(/more than 100000 cliques/);
    expect(estimate(complete(500), 3, limits)).toMatchObject({ exact: false, pairs: 124750 });
  });

  test('too few bytes fail before they are taken', () => {
    expect(() => prepare(complete(12), 3, { simplices: 1e6, bytes: 1000 }, QUIET)).toThrow(
      EngineLimitError,
    );
  });

  test('a stop is obeyed and the rows can be computed again', () => {
    const prepared = prepare(complete(18), 3, AMPLE, QUIET);
    const rows = Uint32Array.from({ length: 17 }, (_, p) => p);
    expect(() => computeRows(prepared, rows, { ...QUIET, shouldStop: () => true })).toThrow(
      EngineStopped,
    );
    expect(computeRows(prepared, rows, QUIET).distances.every((d) => d === 0)).toBe(true);
  });
});

test('the estimate counts the cliques of a complete graph by size', () => {
  expect(estimate(complete(6), 3, AMPLE).cliques).toEqual([6, 15, 20, 15, 6]);
});

test('equal values keep the order of the rows, and -0 equals 0', () => {
  expect([...arrivalOrder(Float64Array.of(2, 0, -0, 2, -1))]).toEqual([4, 1, 2, 0, 3]);
});

test('similarity is 1 where the bound is 0, and looks at the chosen dimensions only', () => {
  expect(similarity([5, 1, 0], 4, [1, 2])).toBe(0.75);
  expect(similarity([0, 0], 0, [0])).toBe(1);
  expect(() => similarity([0], 1, [])).toThrow(EngineInputError);
  expect(() => similarity([0], 1, [1])).toThrow(EngineInputError);
});
