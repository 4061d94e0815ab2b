import { describe, expect, it } from 'vitest';
import type { ImportGrowth } from '#contract/imports';
import { growthGeometry } from '../../src/drawings/growthGeometry';

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
    expect(drawn).toEqual([[left, x[0]]]);
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
});
