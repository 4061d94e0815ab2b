import { z } from 'zod';
import { entryUnitSchema } from './enums';

/** Rows of each list of a difference; the counts are of all. */
export const DIFFERENCE_ROWS = 200;
/** Corrections of one request. */
export const MOST_CORRECTIONS = 200;

const count = z.number().int().nonnegative();
const named = { id: z.string(), label: z.string() };
const window = z.strictObject({ earliest: z.string().nullable(), latest: z.string().nullable() });
const edge = z.strictObject({ a: z.string(), b: z.string() });

const madeFrom = z.number().int().positive();

/** How a revision was made from another of its dataset, which stays as it is. */
export const revisionOrigin = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('threshold'),
    /** Number of the other revision. */
    from: madeFrom,
    least: z.number(),
    /** Edges left out because they are lighter, and because they have no weight. */
    below: count,
    withoutWeight: count,
  }),
  z.strictObject({
    kind: z.literal('corrections'),
    from: madeFrom,
    corrections: z.array(
      z.strictObject({
        id: z.string(),
        /** Entries as they were written. */
        before: z.string(),
        after: z.string(),
        note: z.string(),
      }),
    ),
  }),
]);
export type RevisionOrigin = z.infer<typeof revisionOrigin>;

/** POST …/revisions/:revisionId/threshold: keep the edges of at least this weight. */
export const thresholdRequest = z.strictObject({
  least: z.number('Give a number.'),
});
export type ThresholdRequest = z.infer<typeof thresholdRequest>;

/** One entry as it should have been written. */
export const correctionFields = z.strictObject({
  /** Row of the node in the revision. */
  row: z.number('Choose a node.').int('Choose a node.').nonnegative('Choose a node.'),
  entry: z.string().trim().min(1, 'Write when the node arrived.').max(300),
  /** Left out, an end stays; empty, it is open. */
  earliest: z.string().trim().max(300).optional(),
  latest: z.string().trim().max(300).optional(),
  note: z.string().trim().max(2000).default(''),
});

/** POST …/revisions/:revisionId/corrections. */
export const correctionsRequest = z.strictObject({
  corrections: z
    .array(correctionFields)
    .min(1, 'Name at least one node.')
    .max(MOST_CORRECTIONS, `Correct at most ${MOST_CORRECTIONS} nodes at once.`),
});
export type CorrectionsRequest = z.input<typeof correctionsRequest>;

/** A revision that was made from another. */
export const madeRevision = z.strictObject({
  datasetId: z.uuid(),
  revisionId: z.uuid(),
  number: z.number().int().positive(),
});
export type MadeRevision = z.infer<typeof madeRevision>;

/** What a revision has otherwise than the one before it; nodes are the same where their ids are. */
export const differenceBody = z.strictObject({
  /** Equal where the entries still count in one unit. */
  units: z.strictObject({ before: entryUnitSchema, after: entryUnitSchema }),
  /** Whether nodes of both revisions stand in another order of rows, which orders ties. */
  rowsMoved: z.boolean(),
  counts: z.strictObject({
    nodesAdded: count,
    nodesRemoved: count,
    relabelled: count,
    entriesChanged: count,
    windowsChanged: count,
    edgesAdded: count,
    edgesRemoved: count,
  }),
  nodesAdded: z.array(z.strictObject(named)),
  nodesRemoved: z.array(z.strictObject(named)),
  relabelled: z.array(z.strictObject({ id: z.string(), before: z.string(), after: z.string() })),
  /** Entries as they were written. */
  entriesChanged: z.array(z.strictObject({ ...named, before: z.string(), after: z.string() })),
  /** Ends as they were written; where they were not, by their value. Null for an open end. */
  windowsChanged: z.array(z.strictObject({ ...named, before: window, after: window })),
  /** Ids of both ends. */
  edgesAdded: z.array(edge),
  edgesRemoved: z.array(edge),
});
export type DifferenceBody = z.infer<typeof differenceBody>;

/** GET …/revisions/:revisionId/difference. */
export const revisionDifference = z.strictObject({
  number: z.number().int().positive(),
  /** The revision before it in its dataset; null for the first, which differs from nothing. */
  previous: z.strictObject({ id: z.uuid(), number: z.number().int().positive() }).nullable(),
  difference: differenceBody.nullable(),
});
export type RevisionDifference = z.infer<typeof revisionDifference>;
