import { describe, expect, it } from 'vitest';
import type { RunPart } from '#contract/enums';
import { partWords, readChosen, readWindows } from '../../src/components/run/partWords';
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

describe('chosen pairs', () => {
  const order = Uint32Array.of(3, 1, 0, 2);
  const nothing = { windows: '', nodes: '', pairs: '' };
  it('are written by arrivals and sent by windows of positions and by node rows', () => {
    expect(readChosen({ windows: '1-2', nodes: '4 1', pairs: '3-4' }, order)).toEqual({
      kind: 'chosen',
      windows: [[0, 1]],
      nodes: [2, 3],
      pairs: [[0, 2]],
    });
  });
  it.each([
    [nothing, /at least one/],
    [{ ...nothing, nodes: '5' }, /from 1 to 4/],
    [{ ...nothing, nodes: 'x' }, /no arrival/],
    [{ ...nothing, pairs: '2-9' }, /does not fit/],
    [{ ...nothing, windows: Array.from({ length: 21 }, () => '1-2').join() }, /At most 20 windows/],
  ])('%o is refused in a sentence', (written, sentence) => {
    expect(readChosen(written, order)).toMatch(sentence);
  });
});
