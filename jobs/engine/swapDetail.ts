import { bettiGap } from './bettiCurve';
import { optimalMatching, type Matching } from './bottleneck';
import { changedBars, recordedBars } from './fast/foundation';
import { movedCycles } from './movedCycles';
import type { Prepared } from './prepared';
import { EngineInputError, type PairDetail } from './types';

/**
 * One swap in full: both barcodes and, per dimension, an optimal bottleneck matching of them and a
 * cycle of every bar that moves.
 * @param p, q arrival positions, p < q
 * @throws EngineInputError for positions that are no pair; EngineLimitError
 */
export function swapDetail(prepared: Prepared, p: number, q: number): PairDetail {
  const { nodeCount, values, foundation } = prepared;
  if (!(Number.isInteger(p) && Number.isInteger(q) && 0 <= p && p < q && q < nodeCount)) {
    throw new EngineInputError(
      `Positions ${p} and ${q} are no pair of a network with ${nodeCount} nodes.`,
    );
  }
  const recorded = recordedBars(foundation);
  const swapped = swappedBars(prepared, p, q);
  const matchings = recorded.map((bars, k) => optimalMatching(bars, swapped[k]!));
  return {
    p,
    q,
    bound: values[q]! - values[p]!,
    distances: matchings.map(({ distance }) => distance),
    bettiGaps: recorded.map((bars, k) => bettiGap(bars, swapped[k]!)),
    recorded,
    swapped,
    matchings: matchings.map(({ matches }) => matches),
    realising: matchings.map(realisingMatch),
    cycles: movedCycles(
      prepared,
      { p, q },
      matchings.map(({ matches }) => matches),
    ),
  };
}

function swappedBars(prepared: Prepared, p: number, q: number) {
  try {
    const computation = prepared.computation();
    computation.beginRow(p);
    for (let between = p + 1; between < q; between++) computation.advance(between);
    computation.swap(p, q);
    return changedBars(prepared.foundation, computation.changes.dimensions);
  } catch (error) {
    prepared.forget();
    throw error;
  }
}

/** Index of a match that costs the distance, or -1 where the distance is 0. */
function realisingMatch({ distance, matches }: Matching): number {
  return distance === 0 ? -1 : matches.findIndex(({ cost }) => cost === distance);
}
