import { quoted, type IssueList } from '../issues';
import { isMissing, plainNumber } from '../sources/cellKinds';
import type { FormatLimits } from '../types';
import type { ImportChoices } from './choices';
import { EdgeFold, type FoldedEdges } from './edgeFold';
import type { NodeList } from './nodeRows';
import type { PickedTable } from './tables';
import { readTime } from './times';

/** Which cells of an edge row are read; -1 for none. */
export interface EdgeIndices {
  readonly source: number;
  readonly target: number;
  readonly weight: number;
  readonly time: number;
}

export interface ReadEdges extends FoldedEdges {
  readonly edgeRows: number;
  readonly selfLoops: number;
  /** Rows whose weight is missing or no number; 0 without a weight column. */
  readonly rowsWithoutWeight: number;
}

/** Reads every edge row; ends that no node row has become nodes of the list. */
export function readEdgeRows(
  { file, table }: PickedTable,
  at: EdgeIndices,
  list: NodeList,
  choices: Pick<ImportChoices, 'decimal'>,
  limits: FormatLimits,
  issues: IssueList,
): ReadEdges {
  const fold = new EdgeFold();
  let edgeRows = 0;
  let selfLoops = 0;
  let rowsWithoutWeight = 0;
  for (const { line, cells } of table.rows()) {
    if (edgeRows === limits.edgeRows) {
      const message = `There are more than ${limits.edgeRows} edge rows. Leave the weaker edges out.`;
      issues.add({ file, line, message });
      break;
    }
    edgeRows++;
    const place = { file, line };
    const a = endRow('source', cells[at.source] ?? '', place, list, issues);
    const b = endRow('target', cells[at.target] ?? '', place, list, issues);
    const cell = cells[at.weight] ?? '';
    const weight = at.weight < 0 ? NaN : weightOf(cell, place, choices, issues);
    if (at.weight >= 0 && Number.isNaN(weight)) rowsWithoutWeight++;
    if (a === undefined || b === undefined) continue;
    if (a === b) selfLoops++;
    else fold.add(a, b, weight);
  }
  return { ...fold.fold(list.nodes.length), edgeRows, selfLoops, rowsWithoutWeight };
}

function endRow(
  field: 'source' | 'target',
  id: string,
  place: { file: string; line: number },
  list: NodeList,
  issues: IssueList,
): number | undefined {
  if (id !== '') return list.row(id) ?? list.addNamed(id, place);
  issues.add({ ...place, field, message: `The ${field} is empty. Write the id of a node.` });
  return undefined;
}

/** The weight in a cell, NaN where it is missing or, with an issue, no number. */
function weightOf(
  cell: string,
  place: { file: string; line: number },
  { decimal }: Pick<ImportChoices, 'decimal'>,
  issues: IssueList,
): number {
  const plain = decimal === '.' ? plainNumber(cell) : NaN;
  if (!Number.isNaN(plain)) return plain;
  if (isMissing(cell)) return NaN;
  const read = readTime(cell, { decimal, dayOrder: null, years: 'numbers' });
  if (read.unit === 'number') return read.value;
  issues.add({
    ...place,
    field: 'weight',
    message:
      read.unit === null && /decimal|larger|told apart|thousands/.test(read.message)
        ? read.message
        : `The weight ${quoted(cell)} is not a plain number (12.5). Correct it, or leave the cell empty.`,
  });
  return NaN;
}
