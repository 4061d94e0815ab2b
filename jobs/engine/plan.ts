import { costOf } from './cost';
import { partnersOf, type Partners } from './part';
import type { Prepared } from './prepared';
import type { PairChoice } from './types';

/**
 * A block takes this part of what is left to deal (guided self-scheduling: Polychronopoulos and Kuck
 * 1987), so that the last ones are small and several threads or workers end together.
 */
const SHARE_OF_REST = 1 / 16;
/** Seconds below which a block is not worth its dispatch. */
const LEAST_SECONDS = 0.08;

/** What one block computes. */
export interface Block {
  /** Arrival positions p. */
  readonly rows: Uint32Array;
  /** Null where every pair (p, q), q > p, of the rows is meant. */
  readonly choice: PairChoice | null;
  readonly pairs: number;
  /** Estimate of one thread's seconds. */
  readonly seconds: number;
}

/**
 * Deals the rows of a whole matrix into blocks, as `planPairs`.
 * @returns arrival positions p of every block; each p with a later partner stands in exactly one
 */
export function planBlocks(prepared: Prepared, secondsPerBlock: number): Uint32Array[] {
  const whole = partnersOf({ kind: 'whole' }, prepared.nodeCount);
  return planPairs(prepared, secondsPerBlock, whole).map(({ rows }) => rows);
}

/**
 * Deals the rows of a part into blocks by estimated cost, longest first (Graham, Bounds on
 * multiprocessing timing anomalies, 1969), in ever smaller blocks. Depends only on the network, D and
 * the part, never on the machine.
 *
 * @param secondsPerBlock what a block should take at most; a longer row is a block of its own
 * @returns blocks that hold every pair of the part exactly once
 */
export function planPairs(
  { counts, nodeCount }: Prepared,
  secondsPerBlock: number,
  partners: Partners,
): Block[] {
  const cost = costOf(counts);
  const seconds = Float64Array.from({ length: nodeCount }, (_, p) => cost.of(p, partners.of(p)));
  let rest = seconds.reduce((sum, one) => sum + one, 0);
  const rows = Array.from(seconds.keys()).filter((p) => seconds[p]! > 0);
  rows.sort((p, q) => seconds[q]! - seconds[p]! || p - q);
  const blocks: Block[] = [];
  let block: number[] = [];
  let held = 0;
  const close = () => {
    blocks.push(blockOf(Uint32Array.from(block), partners, held));
    rest -= held;
    [block, held] = [[], 0];
  };
  for (const p of rows) {
    const target = Math.min(secondsPerBlock, Math.max(LEAST_SECONDS, SHARE_OF_REST * rest));
    if (block.length > 0 && held + seconds[p]! > target) close();
    block.push(p);
    held += seconds[p]!;
  }
  if (block.length > 0) close();
  return blocks;
}

function blockOf(rows: Uint32Array, partners: Partners, seconds: number): Block {
  const lists = Array.from(rows, (p) => partners.of(p));
  const pairs = lists.reduce((sum, list) => sum + list.length, 0);
  const whole = lists.every((list, i) => list.length === partners.nodeCount - 1 - rows[i]!);
  if (whole) return { rows, choice: null, pairs, seconds };
  const choice = {
    rows,
    starts: new Uint32Array(rows.length + 1),
    partners: new Uint32Array(pairs),
  };
  lists.forEach((list, i) => {
    choice.starts[i + 1] = choice.starts[i]! + list.length;
    choice.partners.set(list, choice.starts[i]);
  });
  return { rows, choice, pairs, seconds };
}
