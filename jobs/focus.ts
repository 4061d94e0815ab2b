import type { BlockPairs } from '../db/codecs/blockPairs';
import type { RunFocus } from '../db/repositories/runOrders';

/** A block that is planned but not computed. */
export interface WaitingBlock extends BlockPairs {
  readonly block: number;
  readonly pairs: number;
}

/** More blocks are not brought forward: what a reader waits for is then no longer short. */
const MOST = 200;

/**
 * The blocks that hold what a reader looks at: by the share of their pairs that is looked at, the
 * largest first, then by number.
 */
export function blocksInFocus(blocks: readonly WaitingBlock[], focus: RunFocus): number[] {
  return blocks
    .map(({ block, pairs, ...held }) => ({ block, share: countIn(held, focus) / pairs }))
    .filter(({ share }) => share > 0)
    .sort((one, other) => other.share - one.share || one.block - other.block)
    .slice(0, MOST)
    .map(({ block }) => block);
}

function countIn({ rows, choice }: BlockPairs, focus: RunFocus): number {
  let count = 0;
  for (const [i, p] of rows.entries()) {
    const [from, to] = partnersLookedAt(focus, p);
    if (choice === null) {
      // Of whole rows the last partner is not known here, nor needed: a row looked at as a whole counts most.
      count += to === Infinity ? Number.MAX_SAFE_INTEGER : Math.max(0, to - from + 1);
      continue;
    }
    for (const q of choice.partners.subarray(choice.starts[i], choice.starts[i + 1])) {
      if (q >= from && q <= to) count += 1;
    }
  }
  return count;
}

const NONE = [1, 0] as const;

/** First and last position q > p of the pairs (p, q) that are looked at. */
function partnersLookedAt(focus: RunFocus, p: number): readonly [from: number, to: number] {
  switch (focus.kind) {
    case 'pair':
      return p === focus.p ? [focus.q, focus.q] : NONE;
    case 'node':
      if (p === focus.p) return [p + 1, Infinity];
      return p < focus.p ? [focus.p, focus.p] : NONE;
    case 'window':
      return p >= focus.from && p < focus.to ? [p + 1, focus.to] : NONE;
  }
}
