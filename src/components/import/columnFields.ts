import type { ImportDraft, ImportTable } from '#contract/imports';
import type { Issue } from '#contract/problems';
import { formatNoun } from '../../composables/localeFormat';

export type TablePart = 'nodes' | 'edges';

/** The choice of no column; no header is empty. */
export const NONE = '';

interface ColumnField {
  readonly name: string;
  readonly label: string;
  readonly rule: string;
}

/** What columns can be, by table. */
export const COLUMN_FIELDS: Record<
  TablePart,
  { readonly title: string; readonly fields: readonly ColumnField[] }
> = {
  nodes: {
    title: 'Nodes',
    fields: [
      { name: 'id', label: 'Id', rule: 'Names the node in the edges; once only.' },
      { name: 'label', label: 'Label', rule: 'The name people read; the id without one.' },
      { name: 'entry', label: 'Entry', rule: 'When the node arrived: numbers or dates.' },
      { name: 'earliest', label: 'Earliest', rule: 'Where its window begins.' },
      { name: 'latest', label: 'Latest', rule: 'Where its window ends.' },
    ],
  },
  edges: {
    title: 'Edges',
    fields: [
      { name: 'source', label: 'Source', rule: 'Id of one end.' },
      { name: 'target', label: 'Target', rule: 'Id of the other end.' },
      { name: 'weight', label: 'Weight', rule: 'For a threshold; not in the filtration.' },
      { name: 'time', label: 'Time', rule: 'When the edge was seen, for an order from edges.' },
    ],
  },
};

export interface PickedTable {
  readonly file: string;
  readonly table: ImportTable;
}

/** The table of nodes or of edges: one of its own goes before that of a graph file or matrix. */
export function pickedTable({ files }: ImportDraft, part: TablePart): PickedTable | null {
  const have = files.filter((file) => file[part] !== null);
  const file = have.find(({ format }) => format === 'table') ?? have[0];
  const table = file?.[part] ?? null;
  return file === undefined || table === null ? null : { file: file.name, table };
}

/** Columns a table cannot do without. */
const NEEDED: Readonly<Record<string, string>> = {
  id: 'Choose the column that names the nodes, each by a text of its own.',
  source: 'An edge has two ends: choose the column that names this one.',
  target: 'An edge has two ends: choose the column that names this one.',
};

/** What is wrong with a chosen column, or undefined. @param name of a field of COLUMN_FIELDS */
export function columnFault(draft: ImportDraft, part: TablePart, name: string): string | undefined {
  const { edges } = draft.choices.columns;
  const chosen: Record<string, string | null> = { ...draft.choices.columns[part] };
  if (chosen[name] == null) return NEEDED[name];
  if (name === 'target' && edges.source === edges.target) {
    return 'Both ends are the same column. Choose two different ones.';
  }
  const file = pickedTable(draft, part)?.file;
  const own = draft.issues.filter((issue) => issue.file === file && issue.field === name);
  const whole = own.find(({ line }) => line === undefined);
  if (whole !== undefined) return whole.message;
  if (own.length === 0) return undefined;
  const more = draft.issuesLeftOut > 0 ? 'At least ' : '';
  return `${more}${formatNoun(own.length, 'problem')} in its cells, listed under “What was found”.`;
}

/** Which columns of a table still have to be chosen, each in a sentence. */
export function columnNeeds(draft: ImportDraft, part: TablePart): string[] {
  const picked = pickedTable(draft, part);
  if (picked === null) return [];
  const { nodes, edges } = draft.choices.columns;
  const ends = [edges.source, edges.target];
  const lacks = part === 'nodes' ? nodes.id === null : ends.includes(null);
  if (lacks) {
    const what = part === 'nodes' ? 'the nodes' : 'both ends of the edges';
    return [`No column of “${picked.file}” is chosen that names ${what}.`];
  }
  return part === 'edges' && edges.source === edges.target
    ? [`Both ends of the edges are the same column of “${picked.file}”.`]
    : [];
}

/** What columns were taken for, by column. */
export function columnRoles(
  part: TablePart,
  chosen: Readonly<Record<string, string | null>>,
): ReadonlyMap<string, string> {
  const roles = new Map<string, string>();
  for (const { name, label } of COLUMN_FIELDS[part].fields) {
    const column = chosen[name];
    if (column == null) continue;
    const before = roles.get(column);
    roles.set(column, before === undefined ? label : `${before}, ${label}`);
  }
  return roles;
}

/** Problems with the column named as in its file, and what it was taken for where that differs. */
export function withColumnNames(draft: ImportDraft): Issue[] {
  const { columns } = draft.choices;
  const named: Record<TablePart, ReadonlyMap<string, string | null>> = {
    nodes: new Map(Object.entries(columns.nodes)),
    edges: new Map(Object.entries(columns.edges)),
  };
  const files = {
    nodes: pickedTable(draft, 'nodes')?.file,
    edges: pickedTable(draft, 'edges')?.file,
  };
  return draft.issues.map((issue) => {
    const { file, field } = issue;
    if (field === undefined) return issue;
    const part = file === files.edges && named.edges.has(field) ? 'edges' : 'nodes';
    const column = file === files[part] ? named[part].get(field) : undefined;
    return column == null || column === field ? issue : { ...issue, field: `${column} (${field})` };
  });
}
