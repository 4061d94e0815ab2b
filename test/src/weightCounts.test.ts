import { describe, expect, it } from 'vitest';
import { edgesKept, thresholdFor, weightWords } from '../../src/components/import/weightCounts';

const WEIGHTS = {
  nodes: 5,
  edges: 7,
  withoutWeight: 1,
  steps: [
    { least: 0.1, edges: 6 },
    { least: 0.4, edges: 4 },
    { least: 0.9, edges: 1 },
  ],
  complete: true,
};

describe('the live count of edges', () => {
  it('of a threshold is that of the first weight that is not below it', () => {
    expect(edgesKept(WEIGHTS, 'threshold', 0)).toBe(6);
    expect(edgesKept(WEIGHTS, 'threshold', 0.4)).toBe(4);
    expect(edgesKept(WEIGHTS, 'threshold', 0.41)).toBe(1);
    expect(edgesKept(WEIGHTS, 'threshold', 1)).toBe(0);
  });

  it('of a density is its share of all pairs, and never more than have a weight', () => {
    expect(edgesKept(WEIGHTS, 'density', 0.3)).toBe(3);
    expect(edgesKept(WEIGHTS, 'density', 1)).toBe(6);
  });

  it('is unknown without weights or without a number', () => {
    expect(edgesKept(null, 'threshold', 1)).toBeNull();
    expect(edgesKept(WEIGHTS, 'threshold', NaN)).toBeNull();
    expect(weightWords(null, null)).toBe('Counting the edges …');
  });

  it('says what is kept of how many, and how many have no weight', () => {
    expect(weightWords(WEIGHTS, 4)).toBe('Keeps 4 of 7 edges; 1 have no weight.');
    expect(weightWords({ ...WEIGHTS, complete: false, withoutWeight: 0 }, 4)).toBe(
      'Keeps about 4 of 7 edges.',
    );
  });

  it('begins with the middle of the weights', () => {
    expect(thresholdFor(WEIGHTS)).toBe(0.4);
    expect(thresholdFor(null)).toBe(0);
  });
});
