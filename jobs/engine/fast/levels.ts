import { EngineLimitError } from '../types';
import type { Budget } from './budget';
import type { Labelled } from './labels';
import type { Pulse } from './pulse';
import { CliqueWalk, type CliqueVisitor } from './walk';

/** All simplices of one dimension d; simplex s has its d + 1 entries at s * (d + 1). */
export interface Level {
  readonly dimension: number;
  readonly count: number;
  /** Nodes (positions) in written order: the latest, then the others by descending label. */
  readonly nodes: Int32Array;
  /** Id in the dimension below of the facet without the node of the same entry. Empty for d = 0. */
  readonly facets: Int32Array;
  /** Number of children; in the top dimension at most 2 are counted. */
  readonly childCount: Int32Array;
  /** Id of the first child one dimension up, -1 if none; in the top dimension the *node* it adds. */
  readonly firstChild: Int32Array;
}

export interface CliqueCounts {
  /** Simplices by dimension 0..top. */
  readonly simplices: number[];
  /** Simplices of dimension >= 1 with no child that are not a first child: columns to reduce. */
  readonly critical: number;
}

/** Counts simplices and critical columns under one labelling without listing them. */
export function countCliques(
  graph: Labelled,
  top: number,
  budget: Budget,
  pulse: Pulse,
): CliqueCounts {
  const simplices = new Array<number>(top + 1).fill(0);
  let total = 0;
  let critical = 0;
  const visitor: CliqueVisitor = {
    visit(dimension, _node, sibling, _children, count) {
      simplices[dimension]!++;
      if (++total > budget.limits.simplices) throw tooMany(total, budget.limits.simplices);
      if (dimension > 0 && count === 0 && sibling > 0) critical++;
    },
  };
  new CliqueWalk(graph, top, visitor, pulse).run();
  return { simplices, critical };
}

function tooMany(found: number, allowed: number): EngineLimitError {
  return new EngineLimitError(
    'simplices',
    found,
    allowed,
    `The graph has at least ${found} cliques of the sizes that matter; ${allowed} are allowed.`,
  );
}

/** Lists all simplices; ids count the walk's order within a dimension. */
export function listCliques(
  graph: Labelled,
  counts: readonly number[],
  budget: Budget,
  pulse: Pulse,
): Level[] {
  const top = counts.length - 1;
  const levels = counts.map((count, dimension): Level => ({
    dimension,
    count,
    nodes: budget.int32(count * (dimension + 1)),
    facets: budget.int32(dimension === 0 ? 0 : count * (dimension + 1)),
    childCount: budget.int32(count),
    firstChild: budget.none(count),
  }));
  const next = new Int32Array(top + 1);
  const path = new Int32Array(top + 1);
  const visitor: CliqueVisitor = {
    visit(dimension, node, sibling, children, count) {
      const level = levels[dimension]!;
      const id = next[dimension]!++;
      const at = id * (dimension + 1);
      path[dimension] = node;
      for (let i = 0; i <= dimension; i++) level.nodes[at + i] = path[i]!;
      level.childCount[id] = count;
      if (dimension === top && count > 0) level.firstChild[id] = graph.nodeOf[children[0]!]!;
      if (dimension > 0) {
        const parent = next[dimension - 1]! - 1;
        level.facets[at + dimension] = parent;
        if (sibling === 0) levels[dimension - 1]!.firstChild[parent] = id;
      }
    },
  };
  new CliqueWalk(graph, top, visitor, pulse).run();
  for (let d = 1; d <= top; d++) fillFacets(levels, d, graph.labelOf, pulse);
  return levels;
}

/** Id of the child of `parent` that adds `node`; the children's last labels ascend. */
function findChild(
  levels: readonly Level[],
  dimension: number,
  parent: number,
  node: number,
  labelOf: Int32Array,
): number {
  const { firstChild, childCount } = levels[dimension]!;
  const { nodes } = levels[dimension + 1]!;
  const width = dimension + 2;
  const label = labelOf[node]!;
  let low = firstChild[parent]!;
  let high = low + childCount[parent]! - 1;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (labelOf[nodes[middle * width + width - 1]!]! < label) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** All facets but the last, which the walk has stored (the parent). */
function fillFacets(levels: readonly Level[], d: number, labelOf: Int32Array, pulse: Pulse): void {
  const { count, nodes, facets } = levels[d]!;
  const below = levels[d - 1]!;
  for (let s = 0; s < count; s++) {
    const at = s * (d + 1);
    const last = nodes[at + d]!;
    const parent = facets[at + d]!;
    for (let i = 1; i < d; i++) {
      facets[at + i] = findChild(levels, d - 2, below.facets[parent * d + i]!, last, labelOf);
    }
    facets[at] = d === 1 ? last : withoutLatest(levels, d, at, parent, labelOf);
    pulse.tick(4 * d);
  }
}

/** The facet without the latest node: its own latest node moves to the front. */
function withoutLatest(
  levels: readonly Level[],
  d: number,
  at: number,
  parent: number,
  labelOf: Int32Array,
): number {
  const { nodes } = levels[d]!;
  const last = nodes[at + d]!;
  const rest = levels[d - 1]!.facets[parent * d]!;
  const latest = levels[d - 2]!.nodes[rest * (d - 1)]!;
  if (last < latest) return findChild(levels, d - 2, rest, last, labelOf);
  let found = last;
  for (let i = 1; i < d; i++) found = findChild(levels, i - 1, found, nodes[at + i]!, labelOf);
  return found;
}
