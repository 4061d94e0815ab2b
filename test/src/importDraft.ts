import type { ImportDraft, ImportFile, ImportTable } from '#contract/imports';

const table = (columns: string[]): ImportTable => ({
  columns,
  preview: [{ line: 2, cells: columns.map((name) => `a ${name}`) }],
  rowCount: 1,
  where: 'line',
});

export const tableFile = (
  position: number,
  name: string,
  part: 'nodes' | 'edges',
  columns: string[],
): ImportFile => ({
  ...{ position, name, bytes: 10, pasted: false, format: 'table', hint: {} },
  reading: { encoding: 'utf-8', delimiter: ',', decimal: '.', header: true },
  ...{ nodes: null, edges: null, directed: false, dropped: [], notes: [] },
  [part]: table(columns),
});

const NOTHING: ImportDraft['found'] = {
  ...{ nodes: 0, edges: 0, components: 0, isolated: 0, tiedNodes: 0, ties: 0, repeatedLabels: 0 },
  ...{ nodeRows: 0, edgeRows: 0, selfLoops: 0, duplicates: 0, reversed: 0, differingWeights: 0 },
  ...{ directed: false, nodesOnlyInEdges: 0, nodesWithoutEntry: 0, placedLast: 0 },
  ...{ nodesLeftOut: 0, edgesLeftOut: 0, edgesWithoutTime: 0, rowsWithoutWeight: 0 },
  ...{ edgesBelowThreshold: 0, edgesWithoutWeight: 0, leastWeight: null },
  windows: { given: 0, years: 0, months: 0, tolerance: 0 },
  ...{ ignoredColumns: [], dropped: [], orderFrom: '', notes: [] },
};

const CHOICES: ImportDraft['choices'] = {
  columns: {
    nodes: { id: 'id', label: 'name', entry: 'seen', earliest: null, latest: null },
    edges: { source: 'from', target: 'to', weight: null, time: null },
  },
  order: { kind: 'column' },
  ...{ dayOrder: null, years: 'numbers', decimal: '.', tolerance: null, missing: 'refuse' },
  weights: { kind: 'all' },
};

/** A draft of two invented tables, as the server would tell it. */
export const draftOf = (more: Partial<ImportDraft> = {}): ImportDraft => ({
  ...{ id: 'a', name: 'nodes', state: 'open', datasetId: null, datasetName: null },
  ...{ createdAt: '', createdBy: null, updatedAt: '', expiresAt: '', version: 1 },
  files: [
    tableFile(0, 'nodes.csv', 'nodes', ['id', 'name', 'seen']),
    tableFile(1, 'edges.csv', 'edges', ['from', 'to']),
  ],
  ...{ choices: CHOICES, guessed: CHOICES, remembered: false, questions: [], found: NOTHING },
  ...{ issues: [], issuesLeftOut: 0, ready: true, growth: null, estimate: { state: 'none' } },
  saved: null,
  ...more,
});
