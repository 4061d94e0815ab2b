import type { Limits } from '../types';
import { Budget, type Memory } from './budget';
import { collectColumns, type Columns } from './columns';
import { labelGraph, labelsByDegree, labelsByPosition, type Labelled } from './labels';
import { countCliques, listCliques, type CliqueCounts, type Level } from './levels';
import type { Pulse } from './pulse';
import {
  findTopUnions,
  starCandidates,
  summariseUnions,
  type Adjacency,
  type StarCandidates,
  type UnionSummary,
} from './star-columns';
import { completeStar, orderStars, type Star } from './stars';

/** Rows of one dimension 0..D whose first child adds a given node: at start[x]..start[x+1]-1. */
export interface RowsByFirstChild {
  readonly start: Int32Array;
  readonly rows: Int32Array;
}

/** The cliques of a graph, listed, and the columns that its reduction needs. */
export interface Complex {
  readonly nodeCount: number;
  /** D + 1, the dimension of the last columns. */
  readonly top: number;
  readonly budget: Budget;
  /** Dimensions 0..D+1. */
  readonly levels: readonly Level[];
  /** Candidates for critical columns, dimensions 1..D+1 (index 0 unused). */
  readonly columns: readonly Columns[];
}

/** Everything about the graph that no swap changes. Nodes are arrival positions. */
export interface Tables extends Complex {
  /** Dimensions 0..D. */
  readonly stars: readonly Star[];
  /** Candidates for critical star columns, dimensions 1..D+1 (index 0 unused). */
  readonly starColumns: readonly StarCandidates[];
  /** Dimensions 0..D. */
  readonly byFirstChild: readonly RowsByFirstChild[];
  readonly neighbours: Adjacency;
}

/** Which label order to use; `best` counts the critical columns of both and takes the fewer. */
export type LabelOrder = 'best' | 'degree' | 'position' | Int32Array;

export interface TableRequest {
  readonly nodeCount: number;
  /** Two arrival positions per edge. */
  readonly ends: Int32Array;
  readonly maxDimension: number;
  readonly limits: Limits;
  readonly labels: LabelOrder;
  readonly memory: Memory;
}

/** Lists the cliques and the columns; enough to reduce the graph in its own order. */
export function listComplex(request: TableRequest, pulse: Pulse): Complex {
  const budget = new Budget(request.limits, request.memory);
  const top = request.maxDimension + 1;
  const { graph, counts } = chooseLabels(request, top, budget, pulse);
  const levels = listCliques(graph, counts.simplices, budget, pulse);
  const columns = levels.map((level, d) =>
    d === 0 ? collectColumnsOfNothing(budget) : collectColumns(levels, level.dimension, budget),
  );
  return { nodeCount: request.nodeCount, top, budget, levels, columns };
}

export function buildTables(request: TableRequest, pulse: Pulse): Tables {
  const { nodeCount, ends } = request;
  const complex = listComplex(request, pulse);
  const { top, budget, levels } = complex;
  const neighbours = adjacency(nodeCount, ends, budget);
  const { stars, starColumns } = buildStars(levels, nodeCount, neighbours, budget, pulse);
  const byFirstChild = levels
    .slice(0, top)
    .map((_, d) => rowsByFirstChild(levels, d, nodeCount, budget));
  return { ...complex, stars, starColumns, byFirstChild, neighbours };
}

function chooseLabels(
  request: TableRequest,
  top: number,
  budget: Budget,
  pulse: Pulse,
): { graph: Labelled; counts: CliqueCounts } {
  const { nodeCount, ends, labels } = request;
  const count = (labelOf: Int32Array) => {
    const graph = labelGraph(budget, nodeCount, ends, labelOf);
    return { graph, counts: countCliques(graph, top, budget, pulse) };
  };
  if (labels === 'degree') return count(labelsByDegree(nodeCount, ends));
  if (labels === 'position') return count(labelsByPosition(nodeCount));
  if (labels !== 'best') return count(labels);
  const byDegree = count(labelsByDegree(nodeCount, ends));
  const byPosition = count(labelsByPosition(nodeCount));
  return byPosition.counts.critical < byDegree.counts.critical ? byPosition : byDegree;
}

function adjacency(nodeCount: number, ends: Int32Array, budget: Budget): Adjacency {
  const start = budget.int32(nodeCount + 1);
  for (const v of ends) start[v + 1]!++;
  for (let v = 0; v < nodeCount; v++) start[v + 1]! += start[v]!;
  const next = start.slice();
  const items = budget.int32(ends.length);
  for (let i = 0; i < ends.length; i += 2) {
    const u = ends[i]!;
    const v = ends[i + 1]!;
    items[next[u]!++] = v;
    items[next[v]!++] = u;
  }
  for (let v = 0; v < nodeCount; v++) items.subarray(start[v], start[v + 1]).sort();
  return { start, items };
}

function buildStars(
  levels: readonly Level[],
  nodeCount: number,
  neighbours: Adjacency,
  budget: Budget,
  pulse: Pulse,
): { stars: Star[]; starColumns: StarCandidates[] } {
  const top = levels.length - 1;
  const stars: Star[] = [];
  const summaries: UnionSummary[] = [];
  const starColumns: StarCandidates[] = [];
  let order = orderStars(levels, 0, nodeCount, budget, pulse);
  for (let d = 0; d <= top; d++) {
    const above = d < top ? orderStars(levels, d + 1, nodeCount, budget, pulse) : undefined;
    if (above !== undefined) {
      stars.push(completeStar(levels, d, order, above, budget, pulse));
      summaries.push(summariseUnions(levels, d, stars[d]!, budget));
    } else summaries.push(findTopUnions(levels, d, order, neighbours, budget, pulse));
    if (d > 0) {
      const below = { star: stars[d - 1]!, unions: summaries[d - 1]! };
      starColumns[d] = starCandidates(levels, d, order, summaries[d]!, below, budget);
    }
    if (above === undefined) {
      budget.release(order.entry);
      budget.release(order.latest);
    } else order = above;
  }
  for (const { count, node } of summaries) {
    budget.release(count);
    budget.release(node);
  }
  return { stars, starColumns };
}

function collectColumnsOfNothing(budget: Budget): Columns {
  const empty = budget.int32(0);
  return { count: 0, simplex: empty, position: empty, onlyChild: empty, elder: empty };
}

function rowsByFirstChild(
  levels: readonly Level[],
  d: number,
  nodeCount: number,
  budget: Budget,
): RowsByFirstChild {
  const { count, firstChild } = levels[d]!;
  const { nodes } = levels[d + 1]!;
  const width = d + 2;
  const start = budget.int32(nodeCount + 1);
  const added = (r: number) => nodes[firstChild[r]! * width + width - 1]!;
  let total = 0;
  for (let r = 0; r < count; r++) {
    if (firstChild[r]! < 0) continue;
    start[added(r) + 1]!++;
    total++;
  }
  for (let x = 0; x < nodeCount; x++) start[x + 1]! += start[x]!;
  const next = start.slice();
  const rows = budget.int32(total);
  for (let r = 0; r < count; r++) if (firstChild[r]! >= 0) rows[next[added(r)]!++] = r;
  return { start, rows };
}
