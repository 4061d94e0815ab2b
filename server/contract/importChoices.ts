import { z } from 'zod';

/** How a file may be read; the names of formats/sources/types.ts. */
export const SOURCE_FORMATS = [
  'table',
  'matrix',
  'graphml',
  'gexf',
  'node_link',
  'gml',
  'pajek',
] as const;
export const ENCODINGS = ['utf-8', 'utf-16le', 'utf-16be', 'windows-1252'] as const;
export const DELIMITERS = [',', ';', '\t', '|', ' '] as const;
export const DECIMAL_MARKS = ['.', ','] as const;
export const TABLE_ROLES = ['nodes', 'edges'] as const;

export const textReading = z.strictObject({
  encoding: z.enum(ENCODINGS),
  delimiter: z.enum(DELIMITERS),
  decimal: z.enum(DECIMAL_MARKS),
  /** Whether the first row names the columns. */
  header: z.boolean(),
});
export type TextReading = z.infer<typeof textReading>;

/** What somebody said about a file; what is left out is guessed. */
export const sourceHint = z.strictObject({
  format: z.enum(SOURCE_FORMATS).optional(),
  reading: textReading.partial().optional(),
  /** What the rows of a table are. */
  role: z.enum(TABLE_ROLES).optional(),
});
export type SourceHint = z.infer<typeof sourceHint>;

const column = z.string().nullable();

/** The JSON of formats/understanding/choices.ts; a test holds the two together. */
export const importChoices = z.strictObject({
  columns: z.strictObject({
    nodes: z.strictObject({
      id: column,
      label: column,
      entry: column,
      earliest: column,
      latest: column,
    }),
    edges: z.strictObject({ source: column, target: column, weight: column, time: column }),
  }),
  order: z.strictObject({ kind: z.enum(['column', 'rows', 'first_edge']) }),
  /** How 01/02/2024 is read; null while unknown. */
  dayOrder: z.enum(['day_first', 'month_first']).nullable(),
  /** Whether 1987 in the time columns is a number or the interval of that year. */
  years: z.enum(['numbers', 'dates']),
  decimal: z.enum(DECIMAL_MARKS),
  /** ± for nodes without a window of their own, in the entry unit; null for none. */
  tolerance: z.number().nonnegative('A tolerance is 0 or more.').nullable(),
  /** What becomes of nodes without an entry. */
  missing: z.enum(['refuse', 'leave_out', 'last']),
  /** threshold: weight ≥ least; density: the heaviest share (0–1) of all pairs of nodes. */
  weights: z.discriminatedUnion('kind', [
    z.strictObject({ kind: z.literal('all') }),
    z.strictObject({ kind: z.literal('threshold'), least: z.number() }),
    z.strictObject({
      kind: z.literal('density'),
      share: z.number().min(0, 'A share is 0 or more.').max(1, 'A share is 1 at most.'),
    }),
  ]),
});
export type ImportChoices = z.infer<typeof importChoices>;

/** Something that only the person who brings the network in can know. */
export const importQuestion = z.strictObject({
  kind: z.enum(['day_order', 'years', 'order', 'missing']),
  file: z.string(),
  column,
  text: z.string(),
  /** Whether there is no network until it is answered. */
  blocking: z.boolean(),
  /** Cells that raise it, as written. */
  examples: z.array(z.string()),
});
export type ImportQuestion = z.infer<typeof importQuestion>;

export const dropped = z.strictObject({ what: z.string(), count: z.number() });

const count = z.number().int().nonnegative();

/** What was found in the files; formats/understanding/found.ts says what each count means. */
export const importFound = z.strictObject({
  nodes: count,
  edges: count,
  components: count,
  isolated: count,
  tiedNodes: count,
  ties: count,
  repeatedLabels: count,
  nodeRows: count,
  edgeRows: count,
  selfLoops: count,
  duplicates: count,
  reversed: count,
  differingWeights: count,
  directed: z.boolean(),
  nodesOnlyInEdges: count,
  nodesWithoutEntry: count,
  placedLast: count,
  nodesLeftOut: count,
  edgesLeftOut: count,
  edgesWithoutTime: count,
  rowsWithoutWeight: count,
  edgesBelowThreshold: count,
  edgesWithoutWeight: count,
  leastWeight: z.number().nullable(),
  windows: z.strictObject({ given: count, years: count, months: count, tolerance: count }),
  /** 'nodes.csv: habitat'. */
  ignoredColumns: z.array(z.string()),
  dropped: z.array(dropped),
  /** Where the order comes from, in words. */
  orderFrom: z.string(),
  notes: z.array(z.string()),
});
export type ImportFound = z.infer<typeof importFound>;
