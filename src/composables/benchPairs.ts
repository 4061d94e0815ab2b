import type { Run } from '#contract/runs';
import type { Amount } from '../drawings/barWords';
import { firstPositionAt } from '../graphs/filtration';
import { similarityOf } from '../graphs/measures';
import { pairIndex, type Pair, type SwapMatrix } from '../graphs/swapMatrix';
import type { BenchNetwork } from './benchNetwork';
import { writeNumber, writeShare } from './benchWords';

/** Figures of a pair over all chosen dimensions. */
export interface PairFigures {
  readonly index: number;
  readonly distance: number;
  readonly gap: number;
  readonly bound: number;
  readonly similarity: number;
}

/** Reads pairs out of the matrix, in figures and in words. */
export function benchPairs(run: Run, matrix: SwapMatrix, network: BenchNetwork, amount: Amount) {
  const { values } = network.filtration;
  const { dimensions, scale } = run;
  const label = (p: number): string => network.labels[p] ?? '';
  const bound = ({ p, q }: Pair): number => (values[q] ?? 0) - (values[p] ?? 0);

  /** A time of the filtration as a reader knows it: the entry as recorded, or the step. */
  function moment(value: number): string {
    if (scale === 'rank') return `step ${writeNumber(value)}`;
    return network.nodes[firstPositionAt(values, value)]?.entryRaw ?? writeNumber(value);
  }

  /** @returns null until the pair has landed. */
  function figuresOf(pair: Pair): PairFigures | null {
    if (!matrix.isKnown(pair.p, pair.q)) return null;
    const index = pairIndex(matrix.nodeCount, pair.p, pair.q);
    const distance = matrix.largestDistance(dimensions, index);
    return {
      index,
      distance,
      gap: matrix.largestBettiGap(dimensions, index),
      bound: bound(pair),
      similarity: similarityOf(distance, bound(pair)),
    };
  }

  /** Lines of the read-out: names, what the swap does, where the two stand. */
  function describe(pair: Pair): readonly string[] {
    const figures = figuresOf(pair);
    const heading = `${label(pair.p)} ⇄ ${label(pair.q)}`;
    const places = `arrivals ${pair.p + 1} and ${pair.q + 1}`;
    if (figures === null) {
      const index = pairIndex(matrix.nodeCount, pair.p, pair.q);
      const why = matrix.covers(index) ? 'not computed yet' : 'not computed: no part of this run';
      return [heading, places, why];
    }
    const change =
      figures.distance === 0
        ? 'swap-safe: no bar moves'
        : `moves the barcode by ${writeNumber(figures.distance)} of at most ${amount(figures.bound)}`;
    const gap = figures.gap === 0 ? '' : ` · Betti gap ${figures.gap}`;
    return [heading, change, `similarity ${writeShare(figures.similarity)}${gap} · ${places}`];
  }

  return { label, bound, moment, figuresOf, describe };
}
