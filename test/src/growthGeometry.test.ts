import { describe, expect, it } from 'vitest';
import type { ImportGrowth } from '#contract/imports';
import { arrivalNear, growthGeometry, stepAt } from '../../src/drawings/growthGeometry';

const growth = (more: Partial<ImportGrowth> = {}): ImportGrowth => ({
  entryUnit: 'number',
  entries: [0, 5, 10],
  labels: ['a', 'b', 'c'],
  earliest: [null, null, null],
  latest: [null, null, null],
  edgesBy: [0, 1, 2],
  edges: [
    [0, 1],
    [1, 2],
  ],
  ...more,
});

describe('the drawing of a growth', () => {
  it('places nodes at their entries from one end of the axis to the other', () => {
    const { x, left, right } = growthGeometry(growth(), 400);
    expect([...x]).toEqual([left, (left + right) / 2, right]);
  });

  it('places nodes that share one entry in the middle', () => {
    const { x, left, right } = growthGeometry(growth({ entries: [4, 4, 4] }), 400);
    expect([...x]).toEqual(Array(3).fill((left + right) / 2));
  });

  it('makes room for windows that reach past the entries', () => {
    const windows = { earliest: [-10, null, null], latest: [0, null, null] };
    const { x, windows: drawn, left } = growthGeometry(growth(windows), 400);
    expect(x[0]).toBeGreaterThan(left);
    expect(drawn).toMatchObject([{ from: left, to: x[0] }]);
  });

  it('lays windows that overlap in lanes of their own', () => {
    const overlapping = { earliest: [0, 4, 9], latest: [5, 9, 10] };
    const { windows, words, base } = growthGeometry(growth(overlapping), 400);
    const [first, second, third] = windows.map(({ y }) => y);
    expect(second).toBeGreaterThan(first!);
    expect(third).toBe(first);
    expect(first).toBeGreaterThan(base);
    expect(words).toBeGreaterThan(second!);
  });

  it('names round values of the axis, days at midnight, and one value where all entries are equal', () => {
    const round = growthGeometry(growth({ entries: [0, 7, 100] }), 600);
    expect(round.ticks.map(({ value }) => value)).toEqual([0, 20, 40, 60, 80, 100]);
    expect(round.ticks.at(-1)!.x).toBe(round.right);
    const few = growthGeometry(growth({ entries: [1, 2, 3] }), 600);
    expect(few.ticks.map(({ value }) => value)).toEqual([1, 2, 3]);
    const days = growthGeometry(growth({ entryUnit: 'days', entries: [22312, 22330, 22400] }), 600);
    expect(days.ticks.length).toBeGreaterThan(1);
    for (const { value } of days.ticks) {
      expect(Number.isInteger(value)).toBe(true);
      expect(value).toBeGreaterThanOrEqual(22312);
      expect(value).toBeLessThanOrEqual(22400);
    }
    const equal = growthGeometry(growth({ entries: [4, 4, 4] }), 600);
    expect(equal.ticks.map(({ value }) => value)).toEqual([4]);
  });

  it('keeps the words of the axis apart and inside it', () => {
    for (const width of [300, 366, 700, 1052]) {
      const entries = [22300, 22330, 22397];
      const { ticks, left, right } = growthGeometry(growth({ entryUnit: 'days', entries }), width);
      expect(ticks.length).toBeGreaterThan(0);
      ticks.forEach(({ wordsX }, i) => {
        expect(wordsX).toBeGreaterThanOrEqual((ticks[i - 1]?.wordsX ?? left - 84 + 42) + 84);
        expect(wordsX + 42).toBeLessThanOrEqual(right);
      });
    }
  });

  it('raises the curve to its top with the last edge', () => {
    const { curve, top, base, x } = growthGeometry(growth(), 400);
    expect(curve.startsWith(`M${x[0]} ${base}`)).toBe(true);
    expect(curve).toContain(`H${x[2]}V${top}`);
  });

  it('draws an arc per edge, and none where there are too many to tell apart', () => {
    expect(growthGeometry(growth(), 400).arcs).toHaveLength(2);
    const many = Array.from({ length: 4000 }, (): [number, number] => [0, 1]);
    expect(growthGeometry(growth({ edges: many }), 400).arcs).toEqual([]);
    expect(growthGeometry(growth({ edges: null }), 400).arcs).toEqual([]);
  });

  it('draws a band per dimension, each with its own scale of counts', () => {
    const steps = [
      [
        [0, 1],
        [5, 4],
      ],
      [],
    ] as const;
    const { betti, height, x } = growthGeometry(growth(), 400, steps);
    expect(betti.map(({ most }) => most)).toEqual([4, 0]);
    expect(betti[0]!.path).toContain(`H${x[1]}V${betti[0]!.base - 34}`);
    expect(betti[1]!.path).toBe('');
    expect(height).toBeGreaterThan(growthGeometry(growth(), 400).height);
  });

  it('finds the node nearest to a pixel, at both ends too', () => {
    const x = Float64Array.from([10, 20, 40]);
    expect([-5, 14, 16, 29, 31, 900].map((pixel) => arrivalNear(x, pixel))).toEqual([
      0, 0, 1, 1, 2, 2,
    ]);
  });

  it('reads a Betti curve at an entry: nothing before its first step', () => {
    const steps = [
      [2, 1],
      [5, 3],
    ] as const;
    expect([1, 2, 4.9, 5, 100].map((entry) => stepAt(steps, entry))).toEqual([0, 1, 1, 3, 3]);
    expect(stepAt([], 3)).toBe(0);
  });
});
