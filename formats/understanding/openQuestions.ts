import { isMissing } from '../sources/cellKinds';
import type { RawSource } from '../sources/types';
import { IssueList } from '../issues';
import type { ImportChoices, Question } from './choices';
import { hasValues } from './recordedTimes';
import { cellsOf, pickTables, type PickedTable } from './tables';

/**
 * What only the person who brings the network in can know of the order as it is chosen now, and may
 * also leave as it is: it is asked of whichever column is chosen, guessed or not.
 */
export function openQuestions(
  sources: readonly RawSource[],
  choices: ImportChoices,
): readonly Question[] {
  const tables = pickTables(sources, new IssueList());
  if (choices.order.kind === 'rows') {
    const { nodes, edges } = choices.columns;
    return nodes.entry === null && edges.time === null ? orderQuestion(tables) : [];
  }
  // An export says what its times mean.
  if (tables.nodes !== null && hasValues(tables.nodes)) return [];
  const timed = timeColumnOf(tables, choices);
  if (timed === null) return [];
  const asksMissing = choices.order.kind === 'column' && choices.missing === 'refuse';
  return [...yearQuestion(timed), ...(asksMissing ? missingQuestion(timed) : [])];
}

/** A column of times, and those that are read with it. */
export interface TimedColumn extends PickedTable {
  readonly column: string;
  readonly others: readonly (string | null)[];
}

interface Tables {
  readonly nodes: PickedTable | null;
  readonly edges: PickedTable | null;
}

/** The column that the order is chosen to come from; null where it comes from none. */
export function timeColumnOf(
  { nodes, edges }: Tables,
  { order, columns }: Pick<ImportChoices, 'order' | 'columns'>,
): TimedColumn | null {
  const { entry, earliest, latest } = columns.nodes;
  if (order.kind === 'column' && nodes && entry !== null)
    return { ...nodes, column: entry, others: [earliest, latest] };
  const { time } = columns.edges;
  if (order.kind === 'first_edge' && edges && time !== null)
    return { ...edges, column: time, others: [] };
  return null;
}

function orderQuestion({ nodes, edges }: Tables): Question[] {
  const file = (nodes ?? edges)?.file;
  if (file === undefined) return [];
  return [
    {
      kind: 'order',
      file,
      column: null,
      text: 'No column was found that says when the nodes arrived. Is it the order of the rows, or does one of the columns say it?',
      examples: [],
      blocking: false,
    },
  ];
}

function yearQuestion({ file, table, column }: TimedColumn): Question[] {
  const known = cellsOf(table, column).filter((cell) => !isMissing(cell));
  const years = known.filter((cell) => /^(?:1[4-9]|20)\d{2}$/.test(cell));
  if (years.length === 0 || years.length < known.length) return [];
  return [
    {
      kind: 'years',
      file,
      column,
      text: `Are values like ${years[0]} years? As dates each is an interval from its first day to its last; as numbers they are points.`,
      examples: years.slice(0, 5),
      blocking: false,
    },
  ];
}

function missingQuestion({ file, table, column }: TimedColumn): Question[] {
  const at = table.columns.indexOf(column);
  if (at < 0) return [];
  let missing = 0;
  for (const { cells } of table.rows()) if (isMissing(cells[at] ?? '')) missing++;
  if (missing === 0) return [];
  return [
    {
      kind: 'missing',
      file,
      column,
      text: `${missing} ${missing === 1 ? 'node has' : 'nodes have'} no entry. Are they left out, or placed last, or is the import refused?`,
      examples: [],
      blocking: false,
    },
  ];
}
