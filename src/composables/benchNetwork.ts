import type { Revision, RevisionNode } from '#contract/datasets';
import type { Run } from '#contract/runs';
import { filtrationOf, type Filtration } from '../graphs/filtration';

/** The nodes of a run by arrival position. Plain data, never deeply reactive. */
export interface BenchNetwork {
  readonly filtration: Filtration;
  readonly nodes: readonly RevisionNode[];
  readonly labels: readonly string[];
  /** Recorded entries by arrival position, ascending. */
  readonly entries: Float64Array;
}

export function benchNetwork(run: Run, revision: Revision): BenchNetwork {
  const filtration = filtrationOf(
    revision.nodes.map((node) => node.entry),
    run.scale,
  );
  const nodes = [...filtration.order].flatMap((row) => revision.nodes[row] ?? []);
  return {
    filtration,
    nodes,
    labels: nodes.map((node) => node.label),
    entries: Float64Array.from(nodes, (node) => node.entry),
  };
}
