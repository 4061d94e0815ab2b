import { describe, expect, it } from 'vitest';
import { progressShare, progressWords, tabWords } from '../../src/components/run/progressWords';
import type { RunProgress } from '../../src/stores/runs';

const RUNNING: RunProgress = {
  state: 'running',
  pairsDone: 9,
  pairsTotal: 36,
  millisecondsLeft: 3_000,
  failure: null,
  down: false,
};

describe('a run as it goes', () => {
  it('is told in pairs with the time left', () => {
    expect(progressWords(RUNNING)).toBe('9 of 36 pairs · about 3 seconds left');
    expect(progressShare(RUNNING)).toBe(0.25);
    expect(tabWords(RUNNING)).toBe('25 %');
  });

  it('has no time left before there is an estimate', () => {
    expect(progressWords({ ...RUNNING, millisecondsLeft: null })).toBe('9 of 36 pairs');
  });

  it('waits for a worker before it is planned, and divides by no zero', () => {
    const queued: RunProgress = { ...RUNNING, state: 'queued', pairsDone: 0, pairsTotal: 0 };
    expect(progressWords(queued)).toBe('Waiting for a worker');
    expect(progressShare(queued)).toBe(0);
    expect(tabWords(queued)).toBe('waiting');
  });

  it('says when the connection is down', () => {
    expect(progressWords({ ...RUNNING, down: true })).toContain('the connection is down');
  });

  it('leaves the tab to the name once it is done', () => {
    expect(tabWords({ ...RUNNING, state: 'done', pairsDone: 36 })).toBe('');
  });
});
