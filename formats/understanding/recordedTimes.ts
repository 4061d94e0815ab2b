import { quoted, type IssueList } from '../issues';
import type { EntryUnit } from '../types';
import { isExport, VALUE_COLUMNS } from './choices';
import { NO_TIMES, type DraftNode, type NodeTimes, type TimedNodes } from './draft';
import type { PickedTable } from './tables';
import { readTime } from './times';

const UNITS: readonly EntryUnit[] = ['number', 'days', 'seconds'];
const FIELDS = ['entry', 'earliest', 'latest'] as const;

/** Whether a node table carries understood values beside the raw text, as an export does. */
export const hasValues = ({ table }: PickedTable): boolean => isExport(table.columns);

/** Times taken as an export recorded them: values and unit from their columns, only the raw text from the others. */
export function timesAsRecorded(
  { file, table }: PickedTable,
  nodes: readonly DraftNode[],
  issues: IssueList,
): TimedNodes {
  const at = (name: string) => table.columns.indexOf(name);
  let unit: EntryUnit | null = null;
  let row = 0;
  const times: NodeTimes[] = nodes.map(() => NO_TIMES);
  for (const { line, cells } of table.rows()) {
    const node = nodes[row];
    if (!node?.listed) break;
    const written = cells[at(VALUE_COLUMNS.unit)] ?? '';
    const own = UNITS.find((one) => one === written) ?? null;
    unit ??= own;
    if (own === null || own !== unit) {
      issues.add({
        file,
        line,
        field: VALUE_COLUMNS.unit,
        message: `The unit ${quoted(written)} is not ${unit ?? 'number, days or seconds'}, as it has to be in every row.`,
      });
    }
    const [entry = null, earliest = null, latest = null] = FIELDS.map((field) =>
      recorded(file, line, VALUE_COLUMNS[field], cells[at(VALUE_COLUMNS[field])] ?? '', issues),
    );
    times[row++] = {
      entryRaw: node.raw.entry,
      entry,
      earliestRaw: node.raw.earliest,
      earliest,
      latestRaw: node.raw.latest,
      latest,
    };
  }
  const given = times.filter((one) => one.earliest !== null || one.latest !== null).length;
  return {
    unit: unit ?? 'number',
    times,
    given,
    years: 0,
    months: 0,
    edgesWithoutTime: 0,
    ambiguous: [],
  };
}

function recorded(
  file: string,
  line: number,
  field: string,
  cell: string,
  issues: IssueList,
): number | null {
  if (cell === '') return null;
  const read = readTime(cell, { decimal: '.', dayOrder: null, years: 'numbers' });
  if (read.unit === 'number') return read.value;
  issues.add({
    file,
    line,
    field,
    message: `${quoted(cell)} is not a plain number (12.5). Correct it, or remove the columns ${Object.values(VALUE_COLUMNS).join(', ')}.`,
  });
  return null;
}
