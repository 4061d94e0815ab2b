import { describe, expect, it } from 'vitest';
import { cliqueWords, estimateWords, formatSpan } from '../../src/components/run/estimateWords';

describe('what a run would need', () => {
  it('names cliques by what they are called, larger ones by their size', () => {
    expect(cliqueWords([46, 1, 52, 9, 0])).toBe(
      '46 nodes, 1 edge, 52 triangles, 9 cliques of 4 nodes, none larger',
    );
    expect(cliqueWords([3, 2])).toBe('3 nodes, 2 edges');
  });

  it('is a time with its range, starting up included, and memory', () => {
    const allowed = { simplices: 10, bytes: 10, seconds: 10 };
    const part = { kind: 'whole' as const };
    const counted = { maxDimension: 0, cliques: [3, 2], exact: true, pairs: 3, bytes: 3 * 2 ** 20 };
    const rest = { ...counted, part, margin: 4, startUp: 1, allowed, ways: null, refusal: null };
    const words = estimateWords({ ...rest, seconds: 0.4 });
    expect(words).toBe(
      '3 pairs · Cliques: 3 nodes, 2 edges · about 0.4 s of one thread (0.1 s to 2.6 s) · about 3 MiB of memory',
    );
    expect(estimateWords({ ...rest, seconds: 0.005 })).toBe(
      '3 pairs · Cliques: 3 nodes, 2 edges · under 2 s of one thread · about 3 MiB of memory',
    );
  });

  it('times are told in the unit that suits', () => {
    expect([0, 0.123, 89, 90, 3600, 7200].map(formatSpan)).toEqual([
      'under 0.01 s',
      '0.12 s',
      '89 s',
      '1.5 min',
      '60 min',
      '2 h',
    ]);
  });
});
