import { describe, expect, it } from 'vitest';
import { computePairs, computeRows, prepare } from '../../jobs/engine/index';
import { EngineInputError, type Control, type PairChoice } from '../../jobs/engine/types';
import { constantProbability, seeded } from '../support/graphs';

const QUIET: Control = { shouldStop: () => false, onProgress: () => undefined };
const LIMITS = { simplices: 1e6, bytes: 2 ** 28 };
const NODES = 24;

const prepared = (seed: number) =>
  prepare(constantProbability(NODES, 0.45, seed), 3, LIMITS, QUIET);

/** Rows in a drawn order, one of them twice, each with some of its partners or none. */
function drawnChoice(seed: number): PairChoice {
  const source = seeded(seed);
  const rows = Array.from({ length: 15 }, () => source.integer(0, NODES - 1));
  const lists = rows.map((p) =>
    Array.from({ length: NODES - 1 - p }, (_, i) => p + 1 + i).filter(() => source.real() < 0.3),
  );
  const starts = [0];
  for (const list of lists) starts.push(starts.at(-1)! + list.length);
  return {
    rows: Uint32Array.from(rows),
    starts: Uint32Array.from(starts),
    partners: Uint32Array.from(lists.flat()),
  };
}

describe('chosen pairs', () => {
  it.each([1, 2, 3, 4, 5])('have the values they have in the whole matrix (seed %i)', (seed) => {
    const subject = prepared(seed);
    const all = computeRows(
      subject,
      Uint32Array.from({ length: NODES }, (_, p) => p),
      QUIET,
    );
    const firstOf = (p: number) => (p * (2 * NODES - 1 - p)) / 2;
    const choice = drawnChoice(seed);
    const some = computePairs(subject, choice, QUIET);
    expect(some.pairCount).toBe(choice.partners.length);
    choice.rows.forEach((p, i) => {
      for (let at = choice.starts[i]!; at < choice.starts[i + 1]!; at++) {
        const cell = firstOf(p) + choice.partners[at]! - p - 1;
        for (let k = 0; k <= 3; k++) {
          const here = k * some.pairCount + at;
          const there = k * all.pairCount + cell;
          expect(some.distances[here]).toBe(all.distances[there]);
          expect(some.bettiGaps[here]).toBe(all.bettiGaps[there]);
        }
      }
    });
  });

  it('may be none', () => {
    const none = {
      rows: new Uint32Array(),
      starts: new Uint32Array(1),
      partners: new Uint32Array(),
    };
    expect(computePairs(prepared(1), none, QUIET).pairCount).toBe(0);
  });

  it.each([
    ['a partner that is not later', [4], [0, 1], [4]],
    ['partners that do not ascend', [4], [0, 2], [9, 8]],
    ['a position past the last node', [4], [0, 1], [NODES]],
    ['a row past the last node', [NODES], [0, 0], []],
    ['starts that fall', [4, 5], [0, 1, 0], []],
    ['a start that is missing', [4], [0], []],
  ])('are refused with %s', (_, rows, starts, partners) => {
    const choice = {
      rows: Uint32Array.from(rows),
      starts: Uint32Array.from(starts),
      partners: Uint32Array.from(partners),
    };
    expect(() => computePairs(prepared(1), choice, QUIET)).toThrow(EngineInputError);
  });
});
