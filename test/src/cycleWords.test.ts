import { describe, expect, it } from 'vitest';
import { closedWalks, cycleWords, positionsOf } from '../../src/drawings/cycleWords';

const label = (position: number): string => 'ABCDEFGH'.charAt(position);

describe('a cycle by node names', () => {
  it('walks along its edges from the earliest node back to it', () => {
    const edges = [
      [3, 1],
      [0, 2],
      [2, 3],
      [1, 0],
    ];
    expect(cycleWords(1, edges, label)).toBe('A – B – D – C – A');
  });

  it('takes every edge once where two loops share a node', () => {
    const edges = [
      [0, 1],
      [1, 2],
      [2, 0],
      [2, 3],
      [3, 4],
      [4, 2],
    ];
    const walks = closedWalks(edges);
    expect(walks.every((walk) => walk[0] === walk.at(-1))).toBe(true);
    expect(walks.flatMap((walk) => walk.slice(1)).length).toBe(edges.length);
  });

  it('says who joins whom, or which nodes its triangles lie on', () => {
    expect(cycleWords(0, [[4], [1]], label)).toBe('E, until it joins B');
    expect(cycleWords(0, [[4]], label)).toBe('E, which stays apart');
    const shell = [
      [0, 1, 2],
      [0, 1, 3],
      [0, 2, 3],
      [1, 2, 3],
    ];
    expect(cycleWords(2, shell, label)).toBe('4 triangles on A, B, C, D');
    expect(positionsOf(shell)).toEqual([0, 1, 2, 3]);
  });
});
