import { connectivity, sharing } from './description';
import { readEdgesTable } from './edgesTable';
import { IssueList } from './issues';
import { readNodesTable, type NodesTable } from './nodesTable';
import type { FormatLimits, ReadOutcome, SourceFile } from './types';

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
    weights: null,
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
