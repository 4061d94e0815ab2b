import { describe, expect, it } from 'vitest';
import type { RunPart } from '#contract/enums';
import { partWords, readWindows } from '../../src/components/run/partWords';
import { focusOfView } from '../../src/composables/benchFocus';
import { PLAIN_VIEW, readView } from '../../src/composables/benchQuery';

describe('the part of a run in words', () => {
  it.each<[RunPart, string]>([
    [{ kind: 'whole' }, 'every pair'],
    [{ kind: 'within', positions: 1 }, 'pairs within 1 position'],
    [{ kind: 'within', positions: 12 }, 'pairs within 12 positions'],
    [{ kind: 'overlapping' }, 'pairs whose intervals overlap'],
    [
      { kind: 'chosen', windows: [[0, 4]], nodes: [3, 9], pairs: [] },
      'chosen pairs (1 window, 2 whole nodes)',
    ],
  ])('%o', (part, words) => {
    expect(partWords(part)).toBe(words);
  });
});

describe('windows of arrivals', () => {
  it('count from 1 as people write them and from 0 inside', () => {
    expect(readWindows('1-40, 100 – 120;', 200)).toEqual([
      [0, 39],
      [99, 119],
    ]);
  });
  it.each([
    ['', /at least one window/],
    ['5', /no window/],
    ['7-3', /does not fit/],
    ['0-3', /does not fit/],
    ['1-201', /from 1 to 200/],
    ['a-b', /no window/],
  ])('“%s” is refused in a sentence', (text, sentence) => {
    expect(readWindows(text, 200)).toMatch(sentence);
  });
});

describe('what a reader looks at', () => {
  const order = Uint32Array.of(3, 1, 0, 2);
  const view = (query: Record<string, string>) => focusOfView(readView(query, 4), order);
  it('is the chosen pair or node by its rows, else the window, else nothing', () => {
    expect(view({ pair: '1-3' })).toEqual({ kind: 'pair', a: 3, b: 0 });
    expect(view({ node: '4' })).toEqual({ kind: 'node', row: 2 });
    expect(view({ pair: '1-3', node: '4', face: 'node' })).toEqual({ kind: 'node', row: 2 });
    expect(view({ window: '2-4' })).toEqual({ kind: 'window', from: 1, to: 3 });
    expect(focusOfView(PLAIN_VIEW, order)).toBeNull();
  });
});
