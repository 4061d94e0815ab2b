import type { Labelled } from './labels';
import type { Pulse } from './pulse';

/** Receives every clique of 1..top+1 nodes, each before its children, children by ascending label. */
export interface CliqueVisitor {
  /**
   * @param dimension number of nodes less one
   * @param node the node added last (position)
   * @param sibling index among the children of its parent, 0 for the first
   * @param children labels of its children, ascending, at children[0..count-1]; in dimension `top`
   *   at most the first two
   */
  visit(
    dimension: number,
    node: number,
    sibling: number,
    children: Int32Array,
    count: number,
  ): void;
}

/**
 * Depth-first walk over the cliques. A clique is written [its latest node, the others by descending
 * label]; its children add one more node that is earlier than the latest and has a label below all
 * the others'. Each clique is reached once; within a dimension they come in lexicographic order of
 * (position of the latest, labels).
 */
export class CliqueWalk {
  /** Labels of the children of the current clique of each dimension; as long as the longest list. */
  private readonly children: Int32Array[];

  constructor(
    private readonly graph: Labelled,
    private readonly top: number,
    private readonly visitor: CliqueVisitor,
    private readonly pulse: Pulse,
  ) {
    let longest = 2;
    for (let v = 0; v < graph.nodeCount; v++) {
      longest = Math.max(longest, graph.earlierStart[v + 1]! - graph.earlierStart[v]!);
    }
    this.children = Array.from({ length: top + 1 }, () => new Int32Array(longest));
  }

  run(): void {
    const { graph, visitor } = this;
    for (let v = 0; v < graph.nodeCount; v++) {
      const from = graph.earlierStart[v]!;
      const count = graph.earlierStart[v + 1]! - from;
      const children = this.children[0]!;
      for (let i = 0; i < count; i++) children[i] = graph.earlier[from + i]!;
      this.pulse.tick(count + 1);
      visitor.visit(0, v, v, children, this.top === 0 ? Math.min(count, 2) : count);
      if (this.top > 0) this.descend(1, children, count);
    }
  }

  private descend(dimension: number, siblings: Int32Array, count: number): void {
    const { graph, visitor } = this;
    const children = this.children[dimension]!;
    const most = dimension === this.top ? 2 : siblings.length;
    for (let i = 0; i < count; i++) {
      const label = siblings[i]!;
      const found = this.intersect(siblings, i, label, children, most);
      visitor.visit(dimension, graph.nodeOf[label]!, i, children, found);
      if (dimension < this.top && found > 0) this.descend(dimension + 1, children, found);
    }
  }

  /** children := the siblings before index i that are neighbours of `label`; at most `most`. */
  private intersect(
    siblings: Int32Array,
    i: number,
    label: number,
    children: Int32Array,
    most: number,
  ): number {
    const { lower, lowerStart } = this.graph;
    const to = lowerStart[label + 1]!;
    let k = lowerStart[label]!;
    let found = 0;
    for (let j = 0; j < i && k < to && found < most;) {
      const a = siblings[j]!;
      const b = lower[k]!;
      if (a === b) {
        children[found++] = a;
        j++;
        k++;
      } else if (a < b) j++;
      else k++;
    }
    this.pulse.tick(i + 4);
    return found;
  }
}
