import { describe, expect, test } from 'vitest';
import { computeRows, prepare, recordedBarcode, swapDetail } from '../../jobs/engine/index';
import type { Control, Limits, Network } from '../../jobs/engine/types';
import { slowDistance } from '../engine/slowPath';
import {
  ENTRY_KINDS,
  MODELS,
  networkOf,
  randomNetwork,
  seeded,
  withEntries,
} from '../support/graphs';
import { barsOf } from '../published/reading';
import {
  byBar,
  gudhiBarcodes,
  networkxGraphs,
  pairLists,
  ripserBars,
  swapped,
  type PairList,
} from './programs';

const QUIET: Control = { shouldStop: () => false, onProgress: () => undefined };
const AMPLE: Limits = { simplices: 10_000_000, bytes: 2 ** 31 };
const TOP = 3;
/** Graphs of every model and kind of entries: 4 × 5 × 29 = 580, with 0..28 nodes. */
const SIZES = 29;

interface Sample {
  readonly name: string;
  readonly network: Network;
  /** Arrival positions of one swap, p < q; null without a pair. */
  readonly swap: readonly [number, number] | null;
}

function sampleOf(
  model: (typeof MODELS)[number],
  entries: (typeof ENTRY_KINDS)[number],
  n: number,
): Sample {
  const seed = 1000 * MODELS.indexOf(model) + 100 * ENTRY_KINDS.indexOf(entries) + n;
  const source = seeded(seed);
  const p = n < 2 ? 0 : source.integer(0, n - 2);
  return {
    name: `${model}, ${entries}, n = ${n}`,
    network: withEntries(randomNetwork(model, n, seed), entries, seed),
    swap: n < 2 ? null : [p, source.integer(p + 1, n - 1)],
  };
}

const SAMPLES = MODELS.flatMap((model) =>
  ENTRY_KINDS.flatMap((entries) =>
    Array.from({ length: SIZES }, (_, n) => sampleOf(model, entries, n)),
  ),
);

const prepared = (network: Network) => prepare(network, TOP, AMPLE, QUIET);

test('there are at least five hundred random graphs', () => {
  expect(SAMPLES.length).toBeGreaterThanOrEqual(500);
});

describe('barcodes equal those of GUDHI', () => {
  test('in the recorded order', () => {
    const expected = gudhiBarcodes(
      SAMPLES.map(({ network }) => network),
      TOP,
    );
    SAMPLES.forEach(({ name, network }, i) => {
      expect(pairLists(recordedBarcode(prepared(network))), name).toEqual(expected[i]);
    });
  });

  test('after a swap, and the distances equal an exact matching of GUDHI’s two barcodes', () => {
    const pairs = SAMPLES.flatMap(({ name, network, swap }) =>
      swap ? [{ name, network, swap }] : [],
    );
    const before = gudhiBarcodes(
      pairs.map(({ network }) => network),
      TOP,
    );
    const after = gudhiBarcodes(
      pairs.map(({ network, swap }) => swapped(network, swap)),
      TOP,
    );
    pairs.forEach(({ name, network, swap: [p, q] }, i) => {
      const detail = swapDetail(prepared(network), p, q);
      expect(pairLists(detail.swapped), name).toEqual(after[i]);
      const { distances, pairCount } = computeRows(prepared(network), Uint32Array.of(p), QUIET);
      for (let k = 0; k <= TOP; k++) {
        const exact = slowDistance(barsOf(before[i]![k]!), barsOf(after[i]![k]!));
        expect(distances[k * pairCount + q - p - 1], `${name}, d${k}`).toBe(exact);
        expect(detail.distances[k], `${name}, d${k} in full`).toBe(exact);
      }
    });
  });
});

test('bars of dimensions 1 to 3 equal those of ripser, as ranks', () => {
  for (const { name, network } of SAMPLES) {
    if (network.nodeCount < 2) continue;
    const levels = [...new Set(network.values)].sort((x, y) => x - y);
    const rank = new Map(levels.map((value, step) => [value, step]));
    const ranked = (value: number) => (value === Infinity ? Infinity : rank.get(value)!);
    const expected = ripserBars(network, Array.from(network.values, ranked), TOP);
    const own: PairList[] = pairLists(recordedBarcode(prepared(network))).map((pairs) =>
      pairs.map(([birth, death]) => [ranked(birth), ranked(death)] as const).sort(byBar),
    );
    expect(own.slice(1), name).toEqual(expected.slice(1));
  }
});

// Morse inequalities, as used in Kahle, Discrete Math. 309 (2009) (from memory); the numbers were
// computed independently with GUDHI 3.7.1 for these checks, not published.
test('b2 of four graphs G(100, 0.26) by networkx seeds 0 to 3', () => {
  const graphs = networkxGraphs([0, 1, 2, 3].map((seed) => [100, 0.26, seed] as const));
  const rows = graphs.map((edges) => {
    const ready = prepare(networkOf(100, edges), 2, AMPLE, QUIET);
    const [, f1 = 0, f2 = 0, f3 = 0] = ready.counts.bySize;
    const b2 = recordedBarcode(ready)[2]!.deaths.filter((death) => death === Infinity).length;
    return [f2 - f1 - f3, b2];
  });
  expect(rows).toEqual([
    [347, 527],
    [298, 536],
    [326, 524],
    [419, 577],
  ]);
});

test('G(80, 80^-0.75) has loops: 43.0 on average over networkx seeds 0 to 9', () => {
  const graphs = networkxGraphs(
    Array.from({ length: 10 }, (_, seed) => [80, 80 ** -0.75, seed] as const),
  );
  const loops = graphs.map(
    (edges) =>
      recordedBarcode(prepare(networkOf(80, edges), 1, AMPLE, QUIET))[1]!.deaths.filter(
        (death) => death === Infinity,
      ).length,
  );
  expect(Math.min(...loops)).toBeGreaterThan(0);
  expect(loops.reduce((sum, one) => sum + one, 0) / loops.length).toBeCloseTo(43, 0);
});
