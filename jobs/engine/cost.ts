import type { CliqueCounts } from './cliques';
import type { Partners } from './part';

/**
 * What a matrix costs, in seconds of one thread. Common practice, not a law: a pair costs more the
 * more k-cliques a node has and the closer the numbers of k-dimensional holes and of the simplices
 * that could fill them are, because then many long bars change. The factors were fitted to 84 whole
 * matrices on one busy machine (random graphs of four models, n = 50 to 1000, D = 1 to 3): the margin
 * of 5 held on all, 3 on 77. Only counts enter, so every machine plans the same blocks.
 */
const SECONDS_PER_CLIQUE_SET_UP = 9.1e-7;
const SECONDS_PER_CLIQUE_IN_ROWS = 1.05e-6;
const SECONDS_PER_PAIR = 8.9e-7;

/** What holes of one dimension k add to a pair. */
interface HoleCost {
  readonly seconds: number;
  /** Of the number of k-simplices per node. */
  readonly power: number;
  /** Of the number of fillers per hole, while there are fewer than holes. */
  readonly rise: number;
  /** The same, while there are more. */
  readonly fall: number;
}

/** Dimensions 1, 2, 3. */
const HOLE_COSTS: readonly HoleCost[] = [
  { seconds: 2.4e-7, power: 2.06, rise: 0.54, fall: 1.22 },
  { seconds: 1.5e-7, power: 2, rise: 8.7, fall: 4.3 },
  { seconds: 4.7e-11, power: 3, rise: 12, fall: 2.7 },
];
/** Power of how unevenly cliques end, against how unevenly nodes take part in them. */
const POWER_OF_LATE_CLIQUES = 0.76;

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

/** Holes of dimension k are the k-simplices that fill no hole of dimension k - 1. */
function secondsPerPair({ bySize, latest, containing }: CliqueCounts): number {
  const nodes = Math.max(1, bySize[0] ?? 0);
  let holes = Math.max(0, (bySize[1] ?? 0) - nodes + 1);
  let seconds = SECONDS_PER_PAIR;
  HOLE_COSTS.forEach(({ seconds: one, power, rise, fall }, i) => {
    const fillers = bySize[i + 2];
    if (fillers === undefined) return;
    const balance = fillers / (holes + 1);
    const share = balance < 1 ? balance ** rise : balance ** -fall;
    seconds += one * ((bySize[i + 1] ?? 0) / nodes) ** power * share;
    holes = Math.max(0, fillers - holes);
  });
  return seconds * (unevenness(latest) / unevenness(containing)) ** POWER_OF_LATE_CLIQUES;
}

/** Quadratic over arithmetic mean, at least 1. */
function unevenness(counts: Float64Array): number {
  let [sum, squares] = [0, 0];
  for (const count of counts) {
    sum += count;
    squares += count * count;
  }
  return sum > 0 ? Math.sqrt(squares * counts.length) / sum : 1;
}
