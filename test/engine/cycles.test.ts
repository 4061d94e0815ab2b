import { describe, expect, test } from 'vitest';
import { prepare, swapDetail } from '../../jobs/engine/index';
import type { Bars, Network } from '../../jobs/engine/types';
import { MODELS, randomNetwork, withEntries, ENTRY_KINDS } from '../support/graphs';
import { arrival, AMPLE, QUIET } from './fastMatrix';
import { allCliques } from './slowPath';

/** Chains over F2 as sets of keys of node lists. */
type Chain = ReadonlySet<string>;
const keyOf = (nodes: readonly number[]): string => [...nodes].sort((x, y) => x - y).join();

function sum(one: Chain, other: Chain): Set<string> {
  const result = new Set(one);
  for (const key of other) if (!result.delete(key)) result.add(key);
  return result;
}

function boundary(simplices: readonly (readonly number[])[]): Chain {
  let result: Chain = new Set();
  for (const nodes of simplices) {
    const facets = nodes.map((_, at) => keyOf(nodes.filter((_node, i) => i !== at)));
    result = sum(result, new Set(facets));
  }
  return result;
}

/** Whether a chain is a sum of the given ones: elimination by the first key of each. */
function isSum(chain: Chain, of: readonly Chain[]): boolean {
  const basis = new Map<string, Chain>();
  const reduced = (one: Chain): Chain => {
    let rest = one;
    for (;;) {
      const key = [...rest].find((candidate) => basis.has(candidate));
      if (key === undefined) return rest;
      rest = sum(rest, basis.get(key)!);
    }
  };
  for (const one of of) {
    const rest = reduced(one);
    const [key] = rest;
    if (key === undefined) continue;
    for (const [other, old] of basis) if (old.has(key)) basis.set(other, sum(old, rest));
    basis.set(key, rest);
  }
  return reduced(chain).size === 0;
}

/** What is wrong with a cycle of a bar in the order of `values`; null if nothing is. */
function fault(
  network: Network,
  values: ArrayLike<number>,
  bar: { birth: number; death: number },
  simplices: readonly number[][],
  k: number,
): string | null {
  const time = (nodes: readonly number[]) => Math.max(...nodes.map((v) => values[v]!));
  if (k === 0) return time(simplices[0]!) === bar.birth ? null : 'another birth';
  if (Math.max(...simplices.map(time)) !== bar.birth) return 'another birth';
  if (boundary(simplices).size > 0) return 'not closed';
  const chain = new Set(simplices.map(keyOf));
  if (chain.size !== simplices.length) return 'a simplex twice';
  const fillers = allCliques(network, k + 2).filter((nodes) => nodes.length === k + 2);
  const boundedBy = (isMeant: (t: number) => boolean) =>
    isSum(
      chain,
      fillers.filter((nodes) => isMeant(time(nodes))).map((nodes) => boundary([nodes])),
    );
  if (boundedBy((t) => t < bar.death)) return 'filled before';
  if (bar.death < Infinity && !boundedBy((t) => t <= bar.death)) return 'not filled';
  return null;
}

const lists = (flat: Int32Array, width: number, rows: ArrayLike<number>): number[][] =>
  Array.from({ length: flat.length / width }, (_, i) =>
    Array.from(flat.subarray(i * width, (i + 1) * width), (p) => rows[p]!),
  );

describe('a cycle of every bar that moves', () => {
  const found = { finite: [0, 0, 0, 0], infinite: [0, 0, 0, 0] };
  const check = (network: Network): string[] => {
    const faults: string[] = [];
    const { rows } = arrival(network);
    const prepared = prepare(network, 3, AMPLE, QUIET);
    for (let p = 0; p + 1 < network.nodeCount; p += 2) {
      const q = Math.min(network.nodeCount - 1, p + 3);
      const detail = swapDetail(prepared, p, q);
      const values = network.values.slice();
      [values[rows[p]!], values[rows[q]!]] = [values[rows[q]!]!, values[rows[p]!]!];
      detail.cycles.forEach((cycles, k) => {
        for (const [side, at] of [
          ['recorded', network.values],
          ['swapped', values],
        ] as const) {
          const bars: Bars = detail[side][k]!;
          const moved = detail.matchings[k]!.filter(({ cost }) => cost > 0);
          const wanted = moved.map((match) => match[side]).filter((bar) => bar >= 0);
          expect(cycles[side].map(({ bar }) => bar).sort()).toEqual([...wanted].sort());
          for (const { bar, simplices } of cycles[side]) {
            const ends = { birth: bars.births[bar]!, death: bars.deaths[bar]! };
            found[ends.death === Infinity ? 'infinite' : 'finite'][k]!++;
            const width = k === 0 ? 1 : k + 1;
            const wrong = fault(network, at, ends, lists(simplices!, width, rows), k);
            if (wrong !== null)
              faults.push(`${side} ${k} [${ends.birth}, ${ends.death}): ${wrong}`);
          }
        }
      });
    }
    return faults;
  };

  test('is closed, born with its bar, and a boundary from its death on', () => {
    for (let seed = 0; seed < 60; seed++) {
      const model = MODELS[seed % MODELS.length]!;
      const kind = ENTRY_KINDS[seed % ENTRY_KINDS.length]!;
      const network = withEntries(randomNetwork(model, 8 + (seed % 7), seed), kind, seed);
      expect(check(network)).toEqual([]);
    }
    expect(Math.min(...found.finite.slice(0, 3), ...found.infinite.slice(1, 3))).toBeGreaterThan(0);
  });
});
