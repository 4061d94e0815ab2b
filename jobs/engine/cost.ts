import type { CliqueCounts } from './cliques';

/**
 * What the rows of a matrix cost, in seconds of one thread. Common practice, not a law: the work of
 * a row is taken as proportional to the cliques that its node and its partners stand in; the
 * factors were fitted to whole matrices of random graphs on one machine (jobs/benchmark prints the
 * measured times beside them). Only counts enter, so every machine plans the same blocks.
 */
const SECONDS_PER_CLIQUE_IN_STAR = 2.5e-8;
const SECONDS_PER_PAIR = 3e-6;
const SECONDS_PER_CLIQUE_SET_UP = 1.5e-6;

/** Seconds of tables and of the recorded order. */
export function setUpSeconds({ total }: CliqueCounts): number {
  return SECONDS_PER_CLIQUE_SET_UP * total;
}

/** Seconds of row p by arrival position, 0..n-1. */
export function rowSeconds({ containing }: CliqueCounts): Float64Array {
  const n = containing.length;
  const seconds = new Float64Array(n);
  let later = 0;
  for (let p = n - 1; p >= 0; p--) {
    const pairs = n - 1 - p;
    const cliques = later + (pairs + 20) * containing[p]!;
    if (pairs > 0) seconds[p] = SECONDS_PER_PAIR * pairs + SECONDS_PER_CLIQUE_IN_STAR * cliques;
    later += containing[p]!;
  }
  return seconds;
}
