import { z } from 'zod';
import { MAX_DIMENSION, runPartSchema, runStateSchema, scaleSchema, WHOLE } from './enums';

export const dimensionsSchema = z
  .array(z.number().int().min(0).max(MAX_DIMENSION))
  .min(1, 'Choose at least one dimension.')
  .refine((list) => new Set(list).size === list.length, 'Each dimension once.')
  .transform((list) => [...list].sort((a, b) => a - b));

/** POST …/runs; the Idempotency-Key header (any text up to 200 characters) makes a repeat answer the same run. */
export const createRunRequest = z.strictObject({
  revisionId: z.uuid(),
  scale: scaleSchema.default('entry'),
  dimensions: dimensionsSchema.default([1, 2, 3]),
  part: runPartSchema.default(WHOLE),
});
export type CreateRunRequest = z.input<typeof createRunRequest>;

/** A part as JSON in an address. */
const partText = z.string().transform((text, context) => {
  try {
    const parsed = runPartSchema.safeParse(JSON.parse(text));
    if (parsed.success) return parsed.data;
    context.addIssue({ code: 'custom', message: parsed.error.issues[0]?.message ?? 'No part.' });
  } catch {
    context.addIssue({ code: 'custom', message: 'Give a part as JSON, e.g. {"kind":"whole"}.' });
  }
  return z.NEVER;
});

/** GET …/revisions/:revision/estimate?maxDimension=0..3&part={"kind":"within","positions":5} */
export const estimateQuery = z.strictObject({
  maxDimension: z
    .string()
    .regex(new RegExp(`^[0-${MAX_DIMENSION}]$`), `Give a whole number from 0 to ${MAX_DIMENSION}.`)
    .default(String(MAX_DIMENSION))
    .transform(Number),
  part: partText.default(WHOLE),
});

/**
 * What a run of a revision would need up to one highest dimension D, counted before it is queued.
 * Pairs and time are those of the part; cliques and memory do not shrink with it.
 */
export const runEstimate = z.strictObject({
  maxDimension: z.number().int().min(0).max(MAX_DIMENSION),
  part: runPartSchema,
  /** Cliques of 1, 2, .. D + 2 nodes; lower bounds unless `exact`. */
  cliques: z.array(z.number().int().nonnegative()),
  /** False where counting stopped at a cap. */
  exact: z.boolean(),
  pairs: z.number().int().nonnegative(),
  /** Peak of one thread's tables. */
  bytes: z.number().nonnegative(),
  /** Seconds of one warm thread. */
  seconds: z.number().nonnegative(),
  /**
   * The time is between seconds / margin and seconds × margin + startUp. Common practice, fitted to
   * measured runs.
   */
  margin: z.number().min(1),
  /** Seconds that a fresh thread may lose before its code is fast. */
  startUp: z.number().nonnegative(),
  /** What the workers may list, hold, and take of one thread's time. */
  allowed: z.strictObject({ simplices: z.number(), bytes: z.number(), seconds: z.number() }),
  /** What would fit instead, each alone; null where it fits as it is. */
  ways: z
    .strictObject({
      /** The highest lower D. */
      dimension: z.number().int().min(0).nullable(),
      /** The most arrival positions within which all pairs fit. */
      within: z.number().int().positive().nullable(),
      /** The pairs whose entry intervals overlap. */
      overlapping: z
        .strictObject({ pairs: z.number().int().positive(), seconds: z.number() })
        .nullable(),
    })
    .nullable(),
  /** Why such a run is refused, with the number and the ways out; null where it may be started. */
  refusal: z.string().nullable(),
});
export type RunEstimate = z.infer<typeof runEstimate>;

export const run = z.strictObject({
  id: z.uuid(),
  workspaceId: z.uuid(),
  datasetId: z.uuid(),
  datasetName: z.string(),
  invented: z.boolean(),
  revisionId: z.uuid(),
  revisionNumber: z.number().int(),
  contentHash: z.string(),
  number: z.number().int().positive(),
  scale: scaleSchema,
  dimensions: z.array(z.number().int()),
  part: runPartSchema,
  /** What it covered before it was extended to the whole; null unless it was. */
  extendedFrom: runPartSchema.nullable(),
  engineVersion: z.string(),
  state: runStateSchema,
  nodeCount: z.number().int(),
  pairsDone: z.number().int(),
  /** Pairs of the part; 0 until a worker has counted them, unless it is the whole. */
  pairsTotal: z.number().int(),
  /** Blocks of pairs; 0 until the run is planned. */
  blockCount: z.number().int(),
  /** Block numbers already stored, in the order they landed. */
  blocksDone: z.array(z.number().int()),
  requestedBy: z.string().nullable(),
  createdAt: z.iso.datetime(),
  startedAt: z.iso.datetime().nullable(),
  finishedAt: z.iso.datetime().nullable(),
  /** A plain sentence with the number that broke a limit; null unless failed. */
  failure: z.strictObject({ code: z.string(), message: z.string() }).nullable(),
});
export type Run = z.infer<typeof run>;
export const runList = z.strictObject({ runs: z.array(run) });

/** Answer of POST …/runs: 201 with a new run, or 200 with an equal one that is done or under way. */
export const startedRun = run.extend({ found: z.boolean() });
export type StartedRun = z.infer<typeof startedRun>;

/**
 * PUT …/runs/:run/focus: what the reader looks at. Node rows, or first and last arrival position
 * (0 = first to arrive). Its pairs are computed first; it changes no result.
 */
export const runFocusRequest = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('node'), row: z.number().int().nonnegative() }),
  z.strictObject({
    kind: z.literal('pair'),
    a: z.number().int().nonnegative(),
    b: z.number().int().nonnegative(),
  }),
  z.strictObject({
    kind: z.literal('window'),
    from: z.number().int().nonnegative(),
    to: z.number().int().nonnegative(),
  }),
]);
export type RunFocusRequest = z.infer<typeof runFocusRequest>;

/** Bars of one dimension as [birth, death]; death null for a bar that never dies. In the unit of the scale. */
export const barsSchema = z.array(z.tuple([z.number(), z.number().nullable()]));
export type WireBars = z.infer<typeof barsSchema>;

/** GET …/runs/:run/barcode: recorded order; index = dimension 0..max(dimensions). */
export const recordedBarcode = z.strictObject({ bars: z.array(barsSchema) });
export type RecordedBarcode = z.infer<typeof recordedBarcode>;

/**
 * One cycle of many that stands for a bar: its simplices as node rows, the bar's dimension + 1 each (in
 * dimension 0 the node that is born and the one it is joined to); null where it is too long to show.
 */
export const barCycle = z.strictObject({
  /** Index in the barcode of its side. */
  bar: z.number().int(),
  simplices: z.array(z.array(z.number().int())).nullable(),
});
export type BarCycle = z.infer<typeof barCycle>;

/** GET …/runs/:run/pairs/:a/:b with node rows a and b. */
export const pairDetail = z.strictObject({
  /** Node rows. `a` arrives first. */
  a: z.number().int(),
  b: z.number().int(),
  bound: z.number(),
  similarity: z.number(),
  /** One entry per dimension 0..max(dimensions). */
  dimensions: z.array(
    z.strictObject({
      dimension: z.number().int(),
      distance: z.number(),
      bettiGap: z.number().int(),
      recorded: barsSchema,
      swapped: barsSchema,
      /** An optimal bottleneck matching: [index in recorded or -1, index in swapped or -1, cost]. */
      matching: z.array(z.tuple([z.number().int(), z.number().int(), z.number()])),
      /** Index in `matching` of a match that costs the distance, or -1. */
      realising: z.number().int(),
      /** Cycles of the bars that move, those that cost most first; at most 40 a side. */
      cycles: z.strictObject({ recorded: z.array(barCycle), swapped: z.array(barCycle) }),
    }),
  ),
});
export type PairDetail = z.infer<typeof pairDetail>;
