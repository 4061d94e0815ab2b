import type { Dropped } from '../sources/types';

/** What was found in the files of an import, with nothing folded or left out in silence. */
export interface Found {
  /** Nodes and edges of the network as it would be stored. */
  readonly nodes: number;
  readonly edges: number;
  readonly components: number;
  /** Nodes with no edge. */
  readonly isolated: number;
  /** Nodes that share their entry with another, and the entries they share. */
  readonly tiedNodes: number;
  readonly ties: number;
  /** Nodes that share their label with another. */
  readonly repeatedLabels: number;
  readonly nodeRows: number;
  readonly edgeRows: number;
  readonly selfLoops: number;
  /** Edge rows that repeat an edge, in the same direction and in the other. */
  readonly duplicates: number;
  readonly reversed: number;
  /** Edges whose rows have different weights; the largest is kept. */
  readonly differingWeights: number;
  readonly directed: boolean;
  /** Ends of edges (and nodes of a graph file) that the node table lacks. */
  readonly nodesOnlyInEdges: number;
  /** Nodes without an entry, those above among them; then what was done about them. */
  readonly nodesWithoutEntry: number;
  readonly placedLast: number;
  readonly nodesLeftOut: number;
  /** Edges that went with nodes left out. */
  readonly edgesLeftOut: number;
  /** Edge rows without a time, where the order comes from edges. */
  readonly edgesWithoutTime: number;
  readonly rowsWithoutWeight: number;
  readonly edgesBelowThreshold: number;
  readonly edgesWithoutWeight: number;
  /** Least weight kept; null where the choice cut nothing. */
  readonly leastWeight: number | null;
  /** Nodes with a window: from the file, from a year or a month, from the tolerance. */
  readonly windows: {
    readonly given: number;
    readonly years: number;
    readonly months: number;
    readonly tolerance: number;
  };
  /** 'nodes.csv: habitat'. */
  readonly ignoredColumns: readonly string[];
  readonly dropped: readonly Dropped[];
  /** Where the order comes from, in words. */
  readonly orderFrom: string;
  /** What was assumed or decided, in plain sentences. */
  readonly notes: readonly string[];
}

export const NOTHING_FOUND: Found = {
  nodes: 0,
  edges: 0,
  components: 0,
  isolated: 0,
  tiedNodes: 0,
  ties: 0,
  repeatedLabels: 0,
  nodeRows: 0,
  edgeRows: 0,
  selfLoops: 0,
  duplicates: 0,
  reversed: 0,
  differingWeights: 0,
  directed: false,
  nodesOnlyInEdges: 0,
  nodesWithoutEntry: 0,
  placedLast: 0,
  nodesLeftOut: 0,
  edgesLeftOut: 0,
  edgesWithoutTime: 0,
  rowsWithoutWeight: 0,
  edgesBelowThreshold: 0,
  edgesWithoutWeight: 0,
  leastWeight: null,
  windows: { given: 0, years: 0, months: 0, tolerance: 0 },
  ignoredColumns: [],
  dropped: [],
  orderFrom: '',
  notes: [],
};
