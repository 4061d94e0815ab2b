import { rowSeconds } from './cost';
import type { Prepared } from './prepared';

/** A short run is still dealt in so many blocks, so that two threads share it and it shows progress. */
const LEAST_BLOCKS = 8;
/** Seconds below which a block is not worth its dispatch. */
const LEAST_SECONDS = 0.08;

/**
 * Deals the rows of a matrix into blocks by estimated cost, longest first (Graham, Bounds on
 * multiprocessing timing anomalies, 1969). Depends only on the network and D, never on the machine.
 *
 * @param secondsPerBlock what a block should take; a longer row is a block of its own
 * @returns arrival positions p of every block; each p with a later partner stands in exactly one
 */
export function planBlocks({ counts }: Prepared, secondsPerBlock: number): Uint32Array[] {
  const seconds = rowSeconds(counts);
  const total = seconds.reduce((sum, one) => sum + one, 0);
  const target = Math.min(secondsPerBlock, Math.max(LEAST_SECONDS, total / LEAST_BLOCKS));
  const rows = Array.from({ length: Math.max(0, seconds.length - 1) }, (_, p) => p);
  rows.sort((p, q) => seconds[q]! - seconds[p]! || p - q);
  const blocks: Uint32Array[] = [];
  let block: number[] = [];
  let held = 0;
  for (const p of rows) {
    if (block.length > 0 && held + seconds[p]! > target) {
      blocks.push(Uint32Array.from(block));
      [block, held] = [[], 0];
    }
    block.push(p);
    held += seconds[p]!;
  }
  if (block.length > 0) blocks.push(Uint32Array.from(block));
  return blocks;
}
