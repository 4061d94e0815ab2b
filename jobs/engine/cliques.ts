import type { OrderedGraph } from './graph';

/** Cliques counted before any is listed. */
export interface CliqueCounts {
  /** `bySize[s - 1]`: cliques of s nodes, s = 1..maxSize. */
  readonly bySize: Float64Array;
  /** Cliques that contain the node at each place. Length n. */
  readonly containing: Float64Array;
  /** Cliques whose latest node stands at each place. Length n. */
  readonly latest: Float64Array;
  readonly total: number;
  /** False if counting stopped at the cap: every count is then a lower bound. */
  readonly exact: boolean;
}

/** Looks at candidates for one clique counted that are allowed before counting gives up. */
const LOOKS_PER_CLIQUE = 64;

/**
 * Counts the cliques of 1..maxSize nodes until more than `cap` are found, or until the search has
 * looked at 64 candidates per clique allowed. Extends cliques downwards from their latest node, as
 * in Chiba, Nishizeki, Arboricity and subgraph listing algorithms, SIAM J. Comput. 14 (1985), with
 * the arrival order as the acyclic orientation.
 */
export function countCliques(graph: OrderedGraph, maxSize: number, cap: number): CliqueCounts {
  const counter = new CliqueCounter(graph, maxSize, cap);
  for (let i = 0; i < graph.nodeCount && counter.exact; i++) counter.countLatest(i);
  return counter;
}

class CliqueCounter implements CliqueCounts {
  readonly bySize: Float64Array;
  readonly containing: Float64Array;
  readonly latest: Float64Array;
  total = 0;
  exact = true;
  private looks = 0;
  /** Candidates of each depth, the longest that may be needed: the largest number of earlier neighbours. */
  private readonly candidates: Uint32Array[] = [];

  constructor(
    private readonly graph: OrderedGraph,
    private readonly maxSize: number,
    private readonly cap: number,
  ) {
    this.bySize = new Float64Array(maxSize);
    this.containing = new Float64Array(graph.nodeCount);
    this.latest = new Float64Array(graph.nodeCount);
    let longest = 0;
    for (let i = 0; i < graph.nodeCount; i++) {
      longest = Math.max(longest, graph.starts[i + 1]! - graph.starts[i]!);
    }
    for (let size = 0; size <= maxSize; size++) this.candidates.push(new Uint32Array(longest));
  }

  countLatest(i: number): void {
    const { starts, earlier } = this.graph;
    const before = this.total;
    const list = earlier.subarray(starts[i], starts[i + 1]);
    this.candidates[1]!.set(list);
    const found = this.extend(1, list.length);
    this.containing[i] = this.containing[i]! + found;
    this.latest[i] = this.total - before;
  }

  /** Counts a clique of `size` nodes and everything below it; answers how many that were. */
  private extend(size: number, count: number): number {
    this.bySize[size - 1] = this.bySize[size - 1]! + 1;
    this.total++;
    if (this.total > this.cap || this.looks > LOOKS_PER_CLIQUE * this.cap) this.exact = false;
    if (size === this.maxSize) return 1;
    let found = 1;
    const list = this.candidates[size]!;
    for (let k = 0; k < count && this.exact; k++) {
      const node = list[k]!;
      const below = size + 1 === this.maxSize ? 0 : this.intersect(size, count, node);
      const added = this.extend(size + 1, below);
      this.containing[node] = this.containing[node]! + added;
      found += added;
    }
    return found;
  }

  /** The candidates of `size` that are earlier neighbours of `node`, into those of `size + 1`. */
  private intersect(size: number, count: number, node: number): number {
    const { starts, earlier } = this.graph;
    const [from, into] = [this.candidates[size]!, this.candidates[size + 1]!];
    const end = starts[node + 1]!;
    let [length, x, y] = [0, 0, starts[node]!];
    while (x < count && y < end) {
      const [left, right] = [from[x]!, earlier[y]!];
      if (left === right) into[length++] = left;
      if (left <= right) x++;
      if (right <= left) y++;
    }
    this.looks += x + y - starts[node]!;
    return length;
  }
}
