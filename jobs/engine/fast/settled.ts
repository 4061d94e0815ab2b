import { touches, vanishes, type LinkColumns } from './links';
import type { Tables } from './tables';

/**
 * Which columns of the stars, of one dimension d, need no reduction in a swapped complex because they
 * are paired inside their star whatever is around it: those that survive in the link, and those that
 * are, as rows, the pivot of such a column one dimension up. Where both ends of such a bar come at
 * the same time it has no length, and its column is needed only where another one meets its row.
 *
 * All of a's star comes at q, so there every such bar is without length. In b's star sigma comes at
 * its latest node, or at p if that is later; and what a takes part in has to be reduced again.
 */
export interface SettledColumns {
  /** By column as in `StarColumns` (free): the column of the bar, itself or one of d + 1; -1 if none. */
  readonly holder: Int32Array;
  /** Position of the latest node of the holder's sigma. */
  readonly latest: Int32Array;
  /** 1 if the pivot row's sigma has the same latest node. */
  readonly atOnce: Uint8Array;
  /** 1 if the holder is the column itself. */
  readonly itself: Uint8Array;
  /** The links that holders are columns of: `own` if the holder is the column itself. */
  readonly own: LinkColumns | undefined;
  readonly above: LinkColumns | undefined;
}

export function settleColumns(
  tables: Tables,
  links: readonly (LinkColumns | undefined)[],
  d: number,
): SettledColumns | undefined {
  const own = links[d];
  const above = links[d + 1];
  if (d === 0 || (own === undefined && above === undefined)) return undefined;
  const { budget, starColumns, stars } = tables;
  const { free } = starColumns[d]!;
  const count = free.entry.length;
  const settled = {
    holder: budget.none(count),
    latest: budget.int32(count),
    atOnce: budget.uint8(count),
    itself: budget.uint8(count),
    own,
    above,
  };
  for (let x = 0; x < tables.nodeCount; x++) {
    for (let c = free.start[x]!; c < free.start[x + 1]!; c++) {
      const itself = own !== undefined && !vanishes(own, c);
      if (!itself && above === undefined) continue;
      const holder = itself ? c : above!.claimer[stars[d]!.start[x]! + free.local[c]!]!;
      if (holder < 0) continue;
      const latest = starColumns[itself ? d : d + 1]!.free.latest[holder]!;
      settled.holder[c] = holder;
      settled.itself[c] = itself ? 1 : 0;
      settled.latest[c] = latest;
      settled.atOnce[c] = (itself ? own : above!).pivotLatest[holder] === latest ? 1 : 0;
    }
  }
  return settled;
}

/** True if column c of b's star (which leaves q for p, where a was) is settled in the swap. */
export function isSettledB(settled: SettledColumns, c: number, p: number, q: number): boolean {
  const holder = settled.holder[c]!;
  if (holder < 0) return false;
  const latest = settled.latest[c]!;
  if (latest >= q || (latest > p && settled.atOnce[c] === 0)) return false;
  const links = settled.itself[c] === 1 ? settled.own! : settled.above!;
  return !touches(links, holder, p);
}

/** True if column c of a's star, which comes at q, is settled in the swap. */
export function isSettledA(settled: SettledColumns, c: number, q: number): boolean {
  return settled.holder[c]! >= 0 && settled.latest[c]! <= q;
}
