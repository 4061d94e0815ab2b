import { connectivity, sharing } from '../description';
import { IssueList } from '../issues';
import type { RawSource } from '../sources/types';
import type { EntryUnit, FileIssue, FormatLimits, NetworkNode, ReadNetwork } from '../types';
import { checkChoices } from './choiceFaults';
import { VALUE_COLUMNS, type ImportChoices, type Question } from './choices';
import { withoutDefusing } from './defusedCells';
import { readEdgeRows, type EdgeIndices, type ReadEdges } from './edgeRows';
import { NOTHING_FOUND, type Found } from './found';
import { placedWords, placeMissing, type Placed } from './missing';
import { keptEdges, keptNodes } from './network';
import { NodeList, readNodeRows, type NodeIndices } from './nodeRows';
import { orderNodes, type Ordered } from './ordering';
import { hasValues } from './recordedTimes';
import { indicesOf, pickTables, type PickedTable, type PickedTables } from './tables';
import { keepHeavy } from './weights';

/** What sources and choices mean. */
export interface Understanding {
  /** Null while anything is wrong or has to be asked. */
  readonly network: ReadNetwork | null;
  /** All folded edges and their weights, before a threshold; null without a weight column or network. */
  readonly weighted: { readonly edges: Uint32Array; readonly weights: Float64Array } | null;
  readonly found: Found;
  readonly questions: readonly Question[];
  readonly issues: readonly FileIssue[];
  /** Issues past those listed. */
  readonly leftOut: number;
}

const NODE_COLUMNS = ['id', 'label', 'entry', 'earliest', 'latest'] as const;
const EDGE_COLUMNS = ['source', 'target', 'weight', 'time'] as const;
const NO_EDGES: ReadEdges = {
  edges: new Uint32Array(0),
  weights: new Float64Array(0),
  edgeRows: 0,
  selfLoops: 0,
  duplicateEdges: 0,
  reversedEdges: 0,
  differingWeights: 0,
  rowsWithoutWeight: 0,
};

/**
 * Makes the network that the choices mean: never half of it. Everything wrong is listed by file,
 * line and column; everything folded, left out, placed or assumed is counted.
 */
export function understand(
  sources: readonly RawSource[],
  choices: ImportChoices,
  limits: FormatLimits,
): Understanding {
  const issues = new IssueList(limits.issues);
  for (const source of sources) {
    for (const issue of source.issues) issues.add(issue);
    issues.leftOut += source.leftOut;
  }
  const tables = withoutDefusing(pickTables(sources, issues));
  checkChoices(choices, tables, issues);
  const told = {
    ignoredColumns: ignoredColumns(tables, choices),
    dropped: sources.flatMap(({ dropped }) => dropped),
    notes: sources.flatMap(({ file, notes }) => notes.map((note) => `${file}: ${note}`)),
    directed: tables.edges?.source.directed ?? false,
  };
  // With a table or a column missing, every row would be reported.
  const at = issues.any ? null : indices(tables, choices, issues);
  if (!at || issues.any) return refused({ ...NOTHING_FOUND, ...told }, issues, []);
  const list = new NodeList(limits, issues);
  if (tables.nodes) readNodeRows(tables.nodes, at.nodes, list);
  const edges = tables.edges
    ? readEdgeRows(tables.edges, at.edges, list, choices, limits, issues)
    : NO_EDGES;
  nameOthers(tables, list);
  list.checkCount(mainFile(tables));
  if (list.nodes.length === 0 && !issues.any) noNodes(tables, issues);
  const ordered = orderNodes(tables, at.edges, list, choices, issues);
  return finish({ tables, list, edges, ordered, choices, issues, told });
}

interface Indices {
  readonly nodes: NodeIndices;
  readonly edges: EdgeIndices;
}

function indices(tables: PickedTables, { columns }: ImportChoices, issues: IssueList): Indices {
  const nodes = tables.nodes
    ? indicesOf(tables.nodes, columns.nodes, NODE_COLUMNS, issues)
    : { id: -1, label: -1, entry: -1, earliest: -1, latest: -1 };
  const edges = tables.edges
    ? indicesOf(tables.edges, columns.edges, EDGE_COLUMNS, issues)
    : { source: -1, target: -1, weight: -1, time: -1 };
  return { nodes, edges };
}

/** Nodes of a graph file or matrix that the node table beside it lacks. */
function nameOthers({ naming }: PickedTables, list: NodeList): void {
  for (const { file, table } of naming) {
    const at = table.columns.indexOf('id');
    for (const { line, cells } of table.rows()) {
      const id = cells[at] ?? '';
      if (id !== '' && list.row(id) === undefined) list.addNamed(id, { file, line });
    }
  }
}

function noNodes(tables: PickedTables, issues: IssueList): void {
  issues.add({
    file: mainFile(tables),
    message: 'There are no nodes: the file holds no row. Add a row for each node or each edge.',
  });
}

function ignoredColumns({ nodes, edges }: PickedTables, { columns }: ImportChoices): string[] {
  const recorded = nodes && hasValues(nodes) ? Object.values(VALUE_COLUMNS) : [];
  return [
    ...unchosen(nodes, [...NODE_COLUMNS.map((name) => columns.nodes[name]), ...recorded]),
    ...unchosen(
      edges,
      EDGE_COLUMNS.map((name) => columns.edges[name]),
    ),
  ];
}

function unchosen(picked: PickedTable | null, chosen: readonly (string | null)[]): string[] {
  if (!picked) return [];
  const known = new Set(chosen.map((name) => name?.normalize('NFC')));
  return picked.table.columns
    .filter((name) => !known.has(name.normalize('NFC')))
    .map((name) => `${picked.file}: ${name}`);
}

interface Parts {
  readonly tables: PickedTables;
  readonly list: NodeList;
  readonly edges: ReadEdges;
  readonly ordered: Ordered | null;
  readonly choices: ImportChoices;
  readonly issues: IssueList;
  readonly told: Pick<Found, 'ignoredColumns' | 'dropped' | 'notes' | 'directed'>;
}

/** Places nodes without an entry as chosen, unless something is wrong or has to be asked first. */
function finish(parts: Parts): Understanding {
  const { list, ordered, choices, issues } = parts;
  const found = countedRows(parts);
  if (!ordered) return refused(found, issues, []);
  const { timed, why, questions } = ordered;
  // While the order of day and month is unknown, no entry can be told to be missing.
  if (questions.length > 0) return refused(found, issues, questions);
  // Cells that are wrong have their own issues, and are not missing.
  if (issues.any) return refused(found, issues, []);
  const placed = placeMissing(list.nodes, timed.times, choices.missing, why, issues);
  if (placed.leftOut === list.nodes.length) {
    issues.add({
      file: mainFile(parts.tables),
      message: 'No node has an entry, so all of them are left out. Choose another order.',
    });
  }
  return issues.any ? refused(found, issues, []) : made(parts, timed.unit, placed, found);
}

const mainFile = ({ nodes, edges }: PickedTables): string => (nodes ?? edges)?.file ?? '';

/** What is known of the rows before anything is placed or left out. */
function countedRows({ tables, list, edges, ordered, told }: Parts): Found {
  const counted: Found = {
    ...NOTHING_FOUND,
    ...told,
    nodes: list.nodes.length,
    edges: edges.weights.length,
    nodeRows: tables.nodes?.table.rowCount ?? 0,
    edgeRows: edges.edgeRows,
    selfLoops: edges.selfLoops,
    duplicates: edges.duplicateEdges,
    reversed: edges.reversedEdges,
    differingWeights: edges.differingWeights,
    rowsWithoutWeight: edges.rowsWithoutWeight,
    nodesOnlyInEdges: tables.nodes ? list.nodes.filter(({ listed }) => !listed).length : 0,
    ...connectivityOf(list.nodes.length, edges.edges),
    repeatedLabels: sharing(list.nodes, ({ label }) => label.normalize('NFC')),
  };
  if (!ordered) return counted;
  const { timed, orderFrom } = ordered;
  return {
    ...counted,
    orderFrom,
    edgesWithoutTime: timed.edgesWithoutTime,
    windows: { given: timed.given, years: timed.years, months: timed.months, tolerance: 0 },
    nodesWithoutEntry: timed.times.filter(({ entry }) => entry === null).length,
  };
}

/** The network of nodes placed in time. */
function made(
  { tables, list, edges, choices }: Parts,
  entryUnit: EntryUnit,
  placed: Placed,
  counted: Found,
): Understanding {
  const { nodes, rowOf, tolerant } = keptNodes(list.nodes, placed.times, choices.tolerance);
  const all = keptEdges(edges.edges, edges.weights, rowOf);
  const kept = keepHeavy(all.edges, all.weights, nodes.length, choices.weights);
  const found: Found = {
    ...counted,
    ...describe(nodes, kept.edges),
    nodes: nodes.length,
    edges: kept.weights.length,
    placedLast: placed.placedLast,
    nodesLeftOut: placed.leftOut,
    edgesLeftOut: all.gone,
    edgesBelowThreshold: kept.below,
    edgesWithoutWeight: kept.withoutWeight,
    leastWeight: kept.least,
    windows: { ...counted.windows, tolerance: tolerant },
    notes: [
      ...counted.notes,
      ...(placed.placedLast > 0 ? [placedWords(placed.placedLast, entryUnit)] : []),
    ],
  };
  const weighted = choices.columns.edges.weight !== null && tables.edges !== null;
  return {
    network: {
      nodes,
      edges: kept.edges,
      weights: weighted ? kept.weights : null,
      entryUnit,
      report: reportOf(found),
    },
    weighted: weighted ? { edges: all.edges, weights: all.weights } : null,
    found,
    questions: [],
    issues: [],
    leftOut: 0,
  };
}

function refused(found: Found, issues: IssueList, questions: readonly Question[]): Understanding {
  const { listed, leftOut } = issues;
  return { network: null, weighted: null, found, questions, issues: listed, leftOut };
}

function connectivityOf(nodeCount: number, edges: Uint32Array) {
  const { components, isolatedNodes } = connectivity(nodeCount, edges);
  return { components, isolated: isolatedNodes };
}

function describe(nodes: readonly NetworkNode[], edges: Uint32Array) {
  const tiedNodes = sharing(nodes, ({ entry }) => entry);
  const distinct = new Set(nodes.map(({ entry }) => entry)).size;
  return {
    tiedNodes,
    // Every entry that is shared by none stands for one node.
    ties: distinct - (nodes.length - tiedNodes),
    repeatedLabels: sharing(nodes, ({ label }) => label.normalize('NFC')),
    ...connectivityOf(nodes.length, edges),
  };
}

/** The counts that are stored with a revision. */
function reportOf(found: Found): ReadNetwork['report'] {
  return {
    nodeRows: found.nodeRows,
    edgeRows: found.edgeRows,
    selfLoops: found.selfLoops,
    duplicateEdges: found.duplicates,
    reversedEdges: found.reversed,
    tiedNodes: found.tiedNodes,
    repeatedLabels: found.repeatedLabels,
    isolatedNodes: found.isolated,
    components: found.components,
    ignoredColumns: [...found.ignoredColumns],
  };
}
