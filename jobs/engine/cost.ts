import type { CliqueCounts } from './cliques';
import type { Partners } from './part';

/**
 * What a matrix costs, in seconds of one thread. Common practice, not a law: a pair costs more the
 * more edges a node has and the closer the numbers of loops and of triangles are, because then many
 * long bars change. The factors were fitted to 71 whole matrices on one busy machine (random graphs
 * of four models, n = 30 to 1000, D = 1 to 3): the margin of 5 held on all, 4 on 68. Only counts
 * enter, so every machine plans the same blocks.
 */
const SECONDS_PER_CLIQUE_SET_UP = 2e-6;
const SECONDS_PER_CLIQUE_IN_ROWS = 1e-5;
const SECONDS_PER_PAIR = 1.54e-6;
const SECONDS_PER_PAIR_AND_DEGREE_CUBED = 9.24e-9;
/**
 * Share of a row that is spent before its first pair. Common practice: 0.05 to 0.3 on five of six
 * graphs of 80 to 400 nodes, up to the whole row where almost no swap changes a bar.
 */
const SET_UP_OF_ROW = 0.2;

/** Seconds of tables and of the recorded order. */
export function setUpSeconds({ total }: CliqueCounts): number {
  return SECONDS_PER_CLIQUE_SET_UP * total;
}

/** Seconds of row p by arrival position, 0..n-1; the cliques are shared out by stars of the pairs. */
export function rowSeconds(counts: CliqueCounts): Float64Array {
  return costOf(counts).whole;
}

/** What rows and their pairs cost, in seconds. */
export interface RowCost {
  /** Whole rows by arrival position. */
  readonly whole: Float64Array;
  /** The same for some pairs of row p only; 0 for none. */
  of(p: number, partners: Uint32Array): number;
}

/** A row with some of its pairs costs its set-up, and its other seconds by the stars of the pairs. */
export function costOf(counts: CliqueCounts): RowCost {
  const { containing, total } = counts;
  const n = containing.length;
  const stars = new Float64Array(n);
  let [later, all] = [0, 0];
  for (let p = n - 1; p >= 0; p--) {
    if (p < n - 1) stars[p] = later + (n - 1 - p) * containing[p]!;
    later += containing[p]!;
    all += stars[p]!;
  }
  const onePair = secondsPerPair(counts);
  const share = all > 0 ? (SECONDS_PER_CLIQUE_IN_ROWS * total) / all : 0;
  const whole = stars.map((star, p) => onePair * (n - 1 - p) + share * star);
  return {
    whole,
    of(p, partners) {
      if (partners.length === 0 || partners.length === n - 1 - p) {
        return partners.length === 0 ? 0 : whole[p]!;
      }
      let star = partners.length * containing[p]!;
      for (const q of partners) star += containing[q]!;
      const pairs = onePair * partners.length + share * star;
      return SET_UP_OF_ROW * whole[p]! + (1 - SET_UP_OF_ROW) * pairs;
    },
  };
}

/** Seconds of all rows of a part, without tables and recorded order. O(its pairs). */
export function partSeconds(counts: CliqueCounts, partners: Partners): number {
  const cost = costOf(counts);
  return cost.whole.reduce((sum, _, p) => sum + cost.of(p, partners.of(p)), 0);
}

function secondsPerPair({ bySize }: CliqueCounts): number {
  const [nodes = 0, edges = 0, triangles = 0] = bySize;
  const loops = Math.max(0, edges - nodes + 1);
  const balance = Math.min(loops, triangles) / (Math.max(loops, triangles) + 1);
  const degree = nodes > 0 ? (2 * edges) / nodes : 0;
  return SECONDS_PER_PAIR + SECONDS_PER_PAIR_AND_DEGREE_CUBED * degree ** 3 * balance ** 2;
}
