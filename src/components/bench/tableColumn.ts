/** A column of a table of figures; rows are numbered from 0. */
export interface TableColumn {
  readonly key: string;
  /** Header, with the unit. */
  readonly label: string;
  readonly number?: boolean;
  /** What rows are sorted by. */
  readonly value: (row: number) => number | string;
  readonly text: (row: number) => string;
}
