/** The choice of no column; no header is empty. */
export const NONE = '';

interface ColumnField {
  readonly name: string;
  readonly label: string;
  readonly rule: string;
}

/** What columns can be, by table. */
export const COLUMN_FIELDS: Record<
  'nodes' | 'edges',
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
