import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { EdgeFold } from '../../../formats/understanding/edgeFold';
import { keepHeavy } from '../../../formats/understanding/weights';

const NODES = 6;
const rows = fc.array(
  fc
    .tuple(
      fc.nat({ max: NODES - 1 }),
      fc.nat({ max: NODES - 1 }),
      fc.oneof(fc.constantFrom(NaN, 0, 1, -1), fc.double({ noNaN: true })),
    )
    .filter(([a, b]) => a !== b),
  { maxLength: 40 },
);

const folded = (list: readonly (readonly [number, number, number])[]) => {
  const fold = new EdgeFold();
  for (const [a, b, weight] of list) fold.add(a, b, weight);
  return fold.fold(NODES);
};

describe('folded edges', () => {
  test('are every pair once, ascending, with its largest weight', () => {
    fc.assert(
      fc.property(rows, (list) => {
        const largest = new Map<string, number>();
        for (const [a, b, weight] of list) {
          const key = [Math.min(a, b), Math.max(a, b)].join();
          const known = largest.get(key) ?? NaN;
          largest.set(key, Number.isNaN(known) || weight > known ? weight : known);
        }
        const { edges, weights, duplicateEdges, reversedEdges } = folded(list);
        const keys = Array.from(weights, (_, at) => `${edges[2 * at]},${edges[2 * at + 1]}`);
        expect(keys).toEqual([...largest.keys()].sort());
        // Equal zeros of either sign are the same weight.
        expect([...weights].map((w) => w + 0)).toEqual(
          keys.map((key) => (largest.get(key) ?? NaN) + 0),
        );
        expect(duplicateEdges + reversedEdges).toBe(list.length - keys.length);
      }),
      { numRuns: 500, seed: 2 },
    );
  });

  test('tell repeats from reversals, and edges whose rows differ in weight', () => {
    const { duplicateEdges, reversedEdges, differingWeights } = folded([
      [0, 1, 1],
      [0, 1, 1],
      [1, 0, 2],
      [1, 0, 3],
      [2, 3, 5],
      [3, 2, 5],
    ]);
    expect({ duplicateEdges, reversedEdges, differingWeights }).toEqual({
      duplicateEdges: 2,
      reversedEdges: 2,
      differingWeights: 1,
    });
  });
});

describe('a choice of weights', () => {
  test('keeps no edge lighter than one it leaves out, and no fewer than the share has room for', () => {
    fc.assert(
      fc.property(rows, fc.double({ min: 0, max: 1, noNaN: true }), (list, share) => {
        const { edges, weights } = folded(list);
        const kept = keepHeavy(edges, weights, NODES, { kind: 'density', share });
        const known = [...weights].filter((weight) => !Number.isNaN(weight));
        const least = Math.min(...kept.weights);
        const heavier = known.filter((weight) => weight > least).length;
        const room = Math.floor(share * 15 + 1e-9);
        expect(kept.weights.length).toBe(known.filter((weight) => weight >= least).length);
        expect(kept.weights.length).toBeGreaterThanOrEqual(Math.min(room, known.length));
        // Without the edges tied at the cut there is room left.
        if (kept.weights.length > 0) expect(heavier).toBeLessThan(room);
        expect(kept.weights.length + kept.below + kept.withoutWeight).toBe(weights.length);
      }),
      { numRuns: 500, seed: 3 },
    );
  });
});
