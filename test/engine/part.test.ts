import { describe, expect, it } from 'vitest';
import {
  computePairs,
  computeRows,
  countPairs,
  estimate,
  partnersOf,
  planBlocks,
  planPairs,
  prepare,
  remainderOf,
  waysOut,
} from '../../jobs/engine/index';
import { EngineInputError, type Control, type Network, type Part } from '../../jobs/engine/types';
import { constantProbability, networkOf, seeded } from '../support/graphs';

const QUIET: Control = { shouldStop: () => false, onProgress: () => undefined };
const LIMITS = { simplices: 1e6, bytes: 2 ** 28 };
const NODES = 22;

/** Drawn intervals around the positions, some of them touching at one value only. */
function intervals(): Part {
  const source = seeded(7);
  const starts = Float64Array.from({ length: NODES }, (_, p) => p - source.integer(0, 4));
  const ends = Float64Array.from({ length: NODES }, (_, p) => p + source.integer(0, 4));
  return { kind: 'overlapping', starts, ends };
}

const CHOSEN: Part = {
  kind: 'chosen',
  windows: [
    [2, 6],
    [5, 9],
  ],
  nodes: [0, 15],
  pairs: [
    [20, 3],
    [3, 20],
    [4, 5],
  ],
};

const PARTS: readonly (readonly [string, Part])[] = [
  ['whole', { kind: 'whole' }],
  ['within one position', { kind: 'within', positions: 1 }],
  ['within four positions', { kind: 'within', positions: 4 }],
  ['within more positions than there are', { kind: 'within', positions: 99 }],
  ['overlapping', intervals()],
  ['chosen', CHOSEN],
];

/** Whether a part holds a pair, from its definition. */
function holds(part: Part, p: number, q: number): boolean {
  switch (part.kind) {
    case 'whole':
      return true;
    case 'within':
      return q - p <= part.positions;
    case 'overlapping':
      return !(part.ends[p]! < part.starts[q]! || part.ends[q]! < part.starts[p]!);
    case 'chosen':
      return (
        part.windows.some(([from, to]) => from <= p && q <= to) ||
        part.nodes.some((node) => node === p || node === q) ||
        part.pairs.some(([a, b]) => Math.min(a, b) === p && Math.max(a, b) === q)
      );
  }
}

const namesOf = (part: Part): string[] => {
  const names: string[] = [];
  for (let p = 0; p < NODES; p++)
    for (let q = p + 1; q < NODES; q++) if (holds(part, p, q)) names.push(`${p} ${q}`);
  return names;
};

describe.each(PARTS)('the part %s', (_, part) => {
  const partners = partnersOf(part, NODES);

  it('holds the pairs of its definition, and its remainder the others', () => {
    const listed = (one: typeof partners) =>
      Array.from({ length: NODES }, (_row, p) => [...one.of(p)].map((q) => `${p} ${q}`)).flat();
    const inside = namesOf(part);
    expect(listed(partners)).toEqual(inside);
    expect(countPairs(partners)).toBe(inside.length);
    const outside = new Set(namesOf({ kind: 'whole' }));
    for (const name of inside) outside.delete(name);
    expect(listed(remainderOf(partners))).toEqual([...outside]);
  });

  it('is dealt into blocks that hold each of its pairs once, longest first', () => {
    const prepared = prepare(constantProbability(NODES, 0.45, 3), 2, LIMITS, QUIET);
    for (const seconds of [1e-9, 1e-5, 1]) {
      const blocks = planPairs(prepared, seconds, partners);
      const dealt = blocks.flatMap(({ rows, choice }) =>
        [...rows].flatMap((p, i) => {
          const list = choice
            ? choice.partners.subarray(choice.starts[i], choice.starts[i + 1])
            : partnersOf({ kind: 'whole' }, NODES).of(p);
          return [...list].map((q) => `${p} ${q}`);
        }),
      );
      expect([...dealt].sort()).toEqual(namesOf(part).sort());
      expect(blocks.reduce((sum, { pairs }) => sum + pairs, 0)).toBe(dealt.length);
      if (seconds === 1e-9) {
        const costs = blocks.map((block) => block.seconds);
        expect(costs).toEqual([...costs].sort((a, b) => b - a));
      }
    }
  });

  it('computed in blocks gives the values of the whole matrix', () => {
    const prepared = prepare(constantProbability(NODES, 0.45, 3), 2, LIMITS, QUIET);
    const rows = Uint32Array.from({ length: NODES }, (_row, p) => p);
    const all = computeRows(prepared, rows, QUIET);
    const cell = (p: number, q: number) => (p * (2 * NODES - 1 - p)) / 2 + q - p - 1;
    for (const { choice } of planPairs(prepared, 1e-5, partners)) {
      if (!choice) continue;
      const some = computePairs(prepared, choice, QUIET);
      choice.rows.forEach((p, i) => {
        for (let at = choice.starts[i]!; at < choice.starts[i + 1]!; at++) {
          const there = cell(p, choice.partners[at]!);
          for (let k = 0; k <= 2; k++) {
            expect(some.distances[k * some.pairCount + at]).toBe(
              all.distances[k * all.pairCount + there],
            );
          }
        }
      });
    }
  });

  it('is counted by the estimate and never costs more than the whole', () => {
    const network = constantProbability(NODES, 0.45, 3);
    const whole = estimate(network, 3, LIMITS);
    const needed = estimate(network, 3, LIMITS, part);
    expect(needed.pairs).toBe(namesOf(part).length);
    expect(needed.cliques).toEqual(whole.cliques);
    expect(needed.bytes).toBe(whole.bytes);
    expect(needed.seconds).toBeLessThanOrEqual(whole.seconds * (1 + 1e-12));
  });
});

it('whole rows stay whole: nothing is listed for them', () => {
  const prepared = prepare(constantProbability(NODES, 0.45, 3), 2, LIMITS, QUIET);
  const blocks = planPairs(prepared, 1e-5, partnersOf({ kind: 'whole' }, NODES));
  expect(blocks.every(({ choice }) => choice === null)).toBe(true);
  expect(planBlocks(prepared, 1e-5)).toEqual(blocks.map(({ rows }) => rows));
});

it.each<[string, Part]>([
  ['within no position', { kind: 'within', positions: 0 }],
  ['within half a position', { kind: 'within', positions: 1.5 }],
  ['a node past the last', { kind: 'chosen', windows: [], nodes: [NODES], pairs: [] }],
  ['a window past the last', { kind: 'chosen', windows: [[1, NODES]], nodes: [], pairs: [] }],
  [
    'intervals of other nodes',
    { kind: 'overlapping', starts: new Float64Array(3), ends: new Float64Array(3) },
  ],
])('a part is refused: %s', (_, part) => {
  expect(() => partnersOf(part, NODES)).toThrow(EngineInputError);
});

describe('the ways out of an estimate that is over the budget', () => {
  const network = constantProbability(60, 0.5, 4);
  const overlapping: Part = {
    kind: 'overlapping',
    starts: Float64Array.from(network.values, (value) => value - 1),
    ends: Float64Array.from(network.values, (value) => value + 1),
  };
  const wanted = { network, maxDimension: 3, part: { kind: 'whole' } as Part, overlapping };
  const needed = estimate(network, 3, LIMITS);

  it('are none where it fits', () => {
    expect(waysOut(wanted, needed, { ...LIMITS, seconds: needed.seconds })).toBeNull();
  });

  it('each fit where time is the limit, and the next larger number of positions does not', () => {
    const budget = { ...LIMITS, seconds: needed.seconds / 2 };
    const ways = waysOut(wanted, needed, budget)!;
    const at = (positions: number) =>
      estimate(network, 3, LIMITS, { kind: 'within', positions }).seconds;
    expect(ways.within).not.toBeNull();
    expect(at(ways.within!)).toBeLessThanOrEqual(budget.seconds);
    expect(at(ways.within! + 1)).toBeGreaterThan(budget.seconds);
    expect(ways.overlapping).toEqual({
      pairs: estimate(network, 3, LIMITS, overlapping).pairs,
      seconds: estimate(network, 3, LIMITS, overlapping).seconds,
    });
    expect(ways.dimension).not.toBeNull();
    expect(estimate(network, ways.dimension!, LIMITS).seconds).toBeLessThanOrEqual(budget.seconds);
  });

  it('are fewer dimensions alone where cliques are the limit', () => {
    const few = { ...LIMITS, simplices: 3000, seconds: 1e9 };
    const counted = estimate(network, 3, few);
    expect(counted.exact).toBe(false);
    const ways = waysOut(wanted, counted, few)!;
    expect(ways).toMatchObject({ within: null, overlapping: null });
    expect(estimate(network, ways.dimension!, few).exact).toBe(true);
    expect(estimate(network, ways.dimension! + 1, few).exact).toBe(false);
  });
});

describe('hostile networks are answered by the estimate', () => {
  const budget = { simplices: 40_000_000, bytes: 2 * 2 ** 30, seconds: 86_400 };
  const whole: Part = { kind: 'whole' };
  const asked = (network: Network) => {
    const needed = estimate(network, 3, budget);
    const overlapping: Part = {
      kind: 'overlapping',
      starts: network.values,
      ends: network.values,
    };
    const ways = waysOut({ network, maxDimension: 3, part: whole, overlapping }, needed, budget);
    return { needed, ways };
  };

  it('500 nodes all joined: only dimension 0 is left', () => {
    const { needed, ways } = asked(constantProbability(500, 1, 1));
    expect(needed.exact).toBe(false);
    expect(ways).toEqual({ dimension: 0, within: null, overlapping: null });
  }, 20_000);

  it('20 triples joined completely: every clique is counted', () => {
    const joined: [number, number][] = [];
    for (let b = 0; b < 60; b++)
      for (let a = 0; a < b; a++) if (a % 20 !== b % 20) joined.push([a, b]);
    const { cliques, exact } = asked(networkOf(60, joined)).needed;
    expect([cliques, exact]).toEqual([[60, 190 * 9, 1140 * 27, 4845 * 81, 15504 * 243], true]);
  }, 20_000);

  it('a star with 100,000 leaves: counted exactly', () => {
    const leaves = 100_000;
    const edges = Uint32Array.from({ length: 2 * leaves }, (_, k) =>
      k % 2 === 0 ? 0 : (k + 1) / 2,
    );
    const values = Float64Array.from({ length: leaves + 1 }, (_, row) => row);
    const { needed } = asked({ nodeCount: leaves + 1, edges, values });
    expect(needed.cliques).toEqual([leaves + 1, leaves, 0, 0, 0]);
    expect(needed.pairs).toBe((leaves * (leaves + 1)) / 2);
  }, 20_000);

  it('5,000 isolated nodes: counted exactly and allowed', () => {
    const { needed, ways } = asked(networkOf(5_000, []));
    expect(needed.cliques).toEqual([5_000, 0, 0, 0, 0]);
    expect(ways).toBeNull();
  }, 20_000);
});
