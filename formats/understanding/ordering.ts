import { quoted, type IssueList } from '../issues';
import type { ImportChoices, Question } from './choices';
import { timesByColumn } from './columnTimes';
import type { DraftNode, TimedNodes } from './draft';
import type { EdgeIndices } from './edgeRows';
import { timesByFirstEdge } from './edgeTimes';
import type { NodeList } from './nodeRows';
import { hasValues, timesAsRecorded } from './recordedTimes';
import { timesByRow } from './rowTimes';
import type { PickedTables } from './tables';

/** The times of all nodes, where they come from, and what has to be asked. */
export interface Ordered {
  readonly timed: TimedNodes;
  readonly orderFrom: string;
  /** Why a node has no entry. */
  readonly why: (node: DraftNode) => string;
  readonly questions: readonly Question[];
}

/** Finds the entries of the nodes as chosen; null, with an issue, where the choice cannot be followed. */
export function orderNodes(
  tables: PickedTables,
  edgesAt: EdgeIndices,
  list: NodeList,
  choices: ImportChoices,
  issues: IssueList,
): Ordered | null {
  switch (choices.order.kind) {
    case 'column':
      return byColumn(tables, list, choices, issues);
    case 'rows':
      return byRows(tables, list);
    case 'first_edge':
      return byFirstEdge(tables, edgesAt, list, choices, issues);
  }
}

const ONLY_NAMED = (node: DraftNode): string =>
  `The node ${quoted(node.id)} is not among the nodes, so nothing says when it arrived. Add it to the nodes, correct or remove this edge, or choose what happens to nodes without an entry.`;

function byColumn(
  { nodes }: PickedTables,
  list: NodeList,
  choices: ImportChoices,
  issues: IssueList,
): Ordered | null {
  const { entry } = choices.columns.nodes;
  if (!nodes || entry === null) {
    issues.add({
      file: nodes?.file ?? '',
      message: nodes
        ? 'No column is chosen that says when the nodes arrived. Choose one, or take the order from the rows or from the times of the edges.'
        : 'There is no table of nodes, so no column says when they arrived. Take the order from the rows or from the times of the edges.',
    });
    return null;
  }
  const recorded = hasValues(nodes);
  const timed = recorded
    ? timesAsRecorded(nodes, list.nodes, issues)
    : timesByColumn(nodes.file, list.nodes, choices, issues);
  return {
    timed,
    orderFrom: recorded
      ? `The recorded values of ${nodes.file}, with the text of its column “${entry}”.`
      : `The column “${entry}” of ${nodes.file}.`,
    why: (node) =>
      node.listed
        ? 'The entry is missing. Write when this node arrived, or choose what happens to nodes without an entry.'
        : ONLY_NAMED(node),
    questions: dayQuestion(nodes.file, entry, timed.ambiguous),
  };
}

function byRows({ nodes, edges }: PickedTables, list: NodeList): Ordered {
  return {
    timed: timesByRow(list.nodes, { table: nodes !== null }),
    orderFrom: nodes
      ? `The order of the rows of ${nodes.file}.`
      : `The order of the rows of ${edges?.file ?? ''} that first name each node; nodes named first by one row are tied.`,
    why: ONLY_NAMED,
    questions: [],
  };
}

function byFirstEdge(
  { edges }: PickedTables,
  edgesAt: EdgeIndices,
  list: NodeList,
  choices: ImportChoices,
  issues: IssueList,
): Ordered | null {
  const { time } = choices.columns.edges;
  if (!edges || time === null || edgesAt.time < 0) {
    issues.add({
      file: edges?.file ?? '',
      message:
        'No column is chosen that says when the edges were there, so nothing says when their nodes arrived. Choose one, or take the order from a column of the nodes or from the rows.',
    });
    return null;
  }
  const timed = timesByFirstEdge(edges, edgesAt, list, choices, issues);
  return {
    timed,
    orderFrom: `The first time in the column “${time}” of ${edges.file} of any edge at the node.`,
    why: (node) =>
      `The node ${quoted(node.id)} has no edge with a time, so nothing says when it arrived. Add one, or choose what happens to nodes without an entry.`,
    questions: dayQuestion(edges.file, time, timed.ambiguous),
  };
}

/** The question that dates like 01/02/2024 raise, if any do. */
export function dayQuestion(
  file: string,
  column: string,
  examples: readonly string[],
): readonly Question[] {
  if (examples.length === 0) return [];
  return [
    {
      kind: 'day_order',
      file,
      column,
      text: `Dates like ${examples[0]} can be read in two ways. Does the day or the month come first?`,
      examples,
      blocking: true,
    },
  ];
}
