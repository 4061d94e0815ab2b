import type { Budget } from './budget';
import type { Level } from './levels';

/**
 * The simplices of one dimension d >= 1 that may be critical columns of K or of K without a node:
 * at most one child, and not the first child of their facet. By id; a *column* is an index here.
 */
export interface Columns {
  readonly count: number;
  readonly simplex: Int32Array;
  /** Position of the latest node. */
  readonly position: Int32Array;
  /** The node its only child adds, -1 if it has no child (a critical column of K). */
  readonly onlyChild: Int32Array;
  /** If it is the second child of its facet: the node the first child adds; else -1. */
  readonly elder: Int32Array;
}

export function collectColumns(levels: readonly Level[], d: number, budget: Budget): Columns {
  const level = levels[d]!;
  const { nodes, facets, firstChild, childCount } = level;
  const parents = levels[d - 1]!.firstChild;
  const width = d + 1;
  const isColumn = (s: number) => childCount[s]! <= 1 && parents[facets[s * width + d]!] !== s;
  let count = 0;
  for (let s = 0; s < level.count; s++) if (isColumn(s)) count++;
  const columns: Columns = {
    count,
    simplex: budget.int32(count),
    position: budget.int32(count),
    onlyChild: budget.none(count),
    elder: budget.none(count),
  };
  const top = d === levels.length - 1;
  for (let s = 0, c = 0; s < level.count; s++) {
    if (!isColumn(s)) continue;
    columns.simplex[c] = s;
    columns.position[c] = nodes[s * width]!;
    const child = firstChild[s]!;
    if (child >= 0) {
      columns.onlyChild[c] = top ? child : levels[d + 1]!.nodes[child * (width + 1) + width]!;
    }
    if (parents[facets[s * width + d]!] === s - 1) {
      columns.elder[c] = nodes[(s - 1) * width + d]!;
    }
    c++;
  }
  return columns;
}
