import { readEdgesTable } from './edgesTable';
import { IssueList } from './issues';
import { readNodesTable, type NodesTable } from './nodesTable';
import type { FormatLimits, NetworkNode, ReadOutcome, SourceFile } from './types';

/**
 * Reads a network from a node table and an edge table (columns in the README).
 * @returns the network, or everything that is wrong by file, line and column; never half of it
 */
export async function readNetwork(
  nodesFile: SourceFile,
  edgesFile: SourceFile,
  limits: FormatLimits,
): Promise<ReadOutcome> {
  const issues = new IssueList();
  const table = await readNodesTable(nodesFile, limits, issues);
  if (table.nodes.length === 0 && !issues.any) {
    issues.add({
      file: nodesFile.name,
      message: 'There are no nodes below the header. Add a row for each node.',
    });
  }
  // Without nodes every edge would be reported as going nowhere.
  if (table.nodes.length === 0) return refused(issues);
  const { edges, ignoredColumns, ...counts } = await readEdgesTable(
    edgesFile,
    table.rowOf,
    limits,
    issues,
  );
  if (issues.any) return refused(issues);
  return {
    ok: true,
    nodes: table.nodes,
    edges,
    entryUnit: table.entryUnit,
    report: {
      nodeRows: table.nodes.length,
      ...counts,
      ...describeNodes(table, edges),
      ignoredColumns: [
        ...table.ignoredColumns.map((name) => `${nodesFile.name}: ${name}`),
        ...ignoredColumns.map((name) => `${edgesFile.name}: ${name}`),
      ],
    },
  };
}

function refused(issues: IssueList): ReadOutcome {
  return { ok: false, issues: issues.listed, leftOut: issues.leftOut };
}

function describeNodes({ nodes }: NodesTable, edges: Uint32Array) {
  return {
    tiedNodes: sharing(nodes, ({ entry }) => entry),
    repeatedLabels: sharing(nodes, ({ label }) => label.normalize('NFC')),
    ...connectivity(nodes.length, edges),
  };
}

/** How many nodes have their key in common with another node. */
function sharing(
  nodes: readonly NetworkNode[],
  key: (node: NetworkNode) => string | number,
): number {
  const counts = new Map<string | number, number>();
  for (const node of nodes) counts.set(key(node), (counts.get(key(node)) ?? 0) + 1);
  return [...counts.values()].reduce((sum, count) => sum + (count > 1 ? count : 0), 0);
}

/** Components by union with path halving (Tarjan, van Leeuwen 1984). */
function connectivity(
  nodeCount: number,
  edges: Uint32Array,
): { components: number; isolatedNodes: number } {
  const parent = Uint32Array.from({ length: nodeCount }, (_, row) => row);
  const touched = new Uint8Array(nodeCount);
  const root = (start: number): number => {
    let row = start;
    while (parent[row] !== row) {
      parent[row] = parent[parent[row] ?? 0] ?? 0;
      row = parent[row] ?? 0;
    }
    return row;
  };
  let components = nodeCount;
  for (let at = 0; at < edges.length; at += 2) {
    const [a, b] = [edges[at] ?? 0, edges[at + 1] ?? 0];
    touched[a] = touched[b] = 1;
    const [from, to] = [root(a), root(b)];
    if (from === to) continue;
    parent[from] = to;
    components--;
  }
  return { components, isolatedNodes: nodeCount - touched.reduce((sum, one) => sum + one, 0) };
}
