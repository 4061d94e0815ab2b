/** What somebody chose about an import: plain JSON, stored with the draft and with the revision. */
export interface ImportChoices {
  readonly columns: {
    /** Names of columns of the node table; null where there is none. */
    readonly nodes: NodeColumns;
    readonly edges: EdgeColumns;
  };
  readonly order: { readonly kind: OrderKind };
  /** How 01/02/2024 is read; null while unknown (then, if it matters, a question is asked). */
  readonly dayOrder: 'day_first' | 'month_first' | null;
  /** Whether 1987 in the time columns is a number or the interval of that year. */
  readonly years: 'numbers' | 'dates';
  readonly decimal: '.' | ',';
  /** ± for every node without a window of its own, in the entry unit (numbers, days or seconds); null for none. */
  readonly tolerance: number | null;
  readonly missing: MissingPolicy;
  readonly weights: WeightChoice;
}

export interface NodeColumns {
  readonly id: string | null;
  readonly label: string | null;
  readonly entry: string | null;
  readonly earliest: string | null;
  readonly latest: string | null;
}

export interface EdgeColumns {
  readonly source: string | null;
  readonly target: string | null;
  readonly weight: string | null;
  readonly time: string | null;
}

/**
 * column: the entry column; rows: the order of node rows (without a node table, of the edge rows
 * that first name a node); first_edge: the earliest time of any incident edge.
 */
export type OrderKind = 'column' | 'rows' | 'first_edge';

/** Nodes without an entry: refuse the import, leave them and their edges out, or place them last, tied. */
export type MissingPolicy = 'refuse' | 'leave_out' | 'last';

/**
 * threshold keeps edges of weight ≥ least; density keeps the heaviest share (0–1) of all n(n−1)/2
 * pairs, edges tied at the cut together. Edges without a weight stay only under 'all'.
 */
export type WeightChoice =
  | { readonly kind: 'all' }
  | { readonly kind: 'threshold'; readonly least: number }
  | { readonly kind: 'density'; readonly share: number };

/**
 * Columns of a node table that carry understood values beside the raw text, as the writers give
 * them: where entry value and unit are there, values and unit are taken from these columns and only
 * the raw text from the entry, earliest and latest columns. Empty cells and columns that are not
 * there are null. So an export comes back exactly.
 */
export const VALUE_COLUMNS = {
  entry: 'entry_value',
  earliest: 'earliest_value',
  latest: 'latest_value',
  /** number, days or seconds; the same in every row. */
  unit: 'entry_unit',
} as const;

/** Whether columns are those of an export. */
export const isExport = (columns: readonly string[]): boolean =>
  [VALUE_COLUMNS.entry, VALUE_COLUMNS.unit].every((name) => columns.includes(name));

/** Something that only the person who brings the network in can know. */
export interface Question {
  readonly kind: 'day_order' | 'years' | 'order' | 'missing';
  readonly file: string;
  readonly column: string | null;
  readonly text: string;
  /** Whether there is no network until it is answered. */
  readonly blocking: boolean;
  /** Cells that raise it, as written. */
  readonly examples: readonly string[];
}
