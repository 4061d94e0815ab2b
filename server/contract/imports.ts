import { z } from 'zod';
import { createDatasetFields, UPLOAD_LIMITS } from './datasets';
import { entryUnitSchema, importStateSchema } from './enums';
import {
  dropped,
  importChoices,
  importFound,
  importQuestion,
  sourceHint,
  SOURCE_FORMATS,
  textReading,
} from './importChoices';
import { issueSchema } from './problems';

/** Shown on the page before anything is sent; the sizes of one file are those of UPLOAD_LIMITS. */
export const IMPORT_LIMITS = {
  ...UPLOAD_LIMITS,
  /** Files of one import. */
  files: 4,
  /** Bytes of text that is pasted, in UTF-8. */
  pastedBytes: 5 * 1024 * 1024,
  /** Columns of a table, attributes of a graph file. */
  columns: 10_000,
  /** Levels of nesting of XML, JSON and GML. */
  depth: 100,
  /** Days that a draft is kept after it was last changed. */
  days: 30,
} as const;

/** Rows of a table that a draft shows. */
export const PREVIEW_ROWS = 20;
/** Problems that a draft lists; problems.csv has more. */
export const LISTED_PROBLEMS = 200;
/** Past so many edges the growth has no single edges, only their number. */
export const DRAWN_EDGES = 20_000;
/** Steps of the weights. */
export const WEIGHT_STEPS = 200;

/**
 * POST …/imports, multipart/form-data: any number of files up to IMPORT_LIMITS.files, each under the
 * name `files`, and/or the text field `pasted`; beside them these fields. 201 with an `importDraft`,
 * whatever is wrong with the files.
 */
export const createImportFields = z.strictObject({
  /** The draft's name; that of the first file unless given. */
  name: z.string().trim().max(160).optional(),
  /** Where the import becomes a revision of this dataset. */
  datasetId: z.uuid().optional(),
  pasted: z.string().optional(),
});

const count = z.number().int().nonnegative();

export const importTable = z.strictObject({
  /** Each once; choices name columns by these. */
  columns: z.array(z.string()),
  /** The first PREVIEW_ROWS rows; a cell past 300 characters is cut and ends in …. */
  preview: z.array(z.strictObject({ line: count, cells: z.array(z.string()) })),
  rowCount: count,
  /** What `line` counts: lines of the file, or its elements. */
  where: z.enum(['line', 'element']),
});
export type ImportTable = z.infer<typeof importTable>;

export const importFile = z.strictObject({
  /** 0, 1, … in the order sent. */
  position: count,
  /** Each once in an import; issues and questions name files by it. */
  name: z.string(),
  bytes: count,
  pasted: z.boolean(),
  /** As read; null where the file could not be read at all. */
  format: z.enum(SOURCE_FORMATS).nullable(),
  reading: textReading.nullable(),
  /** What was said about it instead of being guessed. */
  hint: sourceHint,
  /** A table is one of the two; a graph file or matrix may be both; null for neither. */
  nodes: importTable.nullable(),
  edges: importTable.nullable(),
  directed: z.boolean(),
  dropped: z.array(dropped),
  /** What was assumed, in plain sentences. */
  notes: z.array(z.string()),
});
export type ImportFile = z.infer<typeof importFile>;

/** What the drawing of the growth needs. All lists are in the order of arrival, by entry and then by row. */
export const importGrowth = z.strictObject({
  entryUnit: entryUnitSchema,
  entries: z.array(z.number()),
  labels: z.array(z.string()),
  /** Windows; null where a node has none. */
  earliest: z.array(z.number().nullable()),
  latest: z.array(z.number().nullable()),
  /** How many edges are there once this node and all before it have arrived. */
  edgesBy: z.array(count),
  /** Edges as pairs of arrival positions (0 = first), lower first; null past DRAWN_EDGES. */
  edges: z.array(z.tuple([count, count])).nullable(),
});
export type ImportGrowth = z.infer<typeof importGrowth>;

/**
 * What a full matrix would need, counted by a worker. `waiting` is answered by asking again; `none`
 * where there is no network yet.
 */
export const importEstimate = z.discriminatedUnion('state', [
  z.strictObject({ state: z.literal('none') }),
  z.strictObject({ state: z.literal('waiting') }),
  z.strictObject({ state: z.literal('failed'), message: z.string() }),
  z.strictObject({
    state: z.literal('ready'),
    /** The highest dimension counted for. */
    maxDimension: count,
    /** Cliques of 1, 2, .. maxDimension + 2 nodes; lower bounds unless `exact`. */
    cliques: z.array(count),
    exact: z.boolean(),
    pairs: count,
    /** Seconds of one warm thread for all pairs; true within a factor of `margin`, plus `startUp` s. */
    seconds: z.number().nonnegative(),
    margin: z.number().min(1),
    startUp: z.number().nonnegative(),
    /** Betti curve by dimension as steps [entry, value from there on]; null where it was not computed. */
    betti: z.array(z.array(z.tuple([z.number(), count]))).nullable(),
  }),
]);
export type ImportEstimate = z.infer<typeof importEstimate>;

const draftHead = {
  id: z.uuid(),
  name: z.string(),
  /** `saved` for good, with `saved` set; drafts that are left are removed at `expiresAt`. */
  state: importStateSchema,
  /** Where it is to become a revision. */
  datasetId: z.uuid().nullable(),
  datasetName: z.string().nullable(),
  createdAt: z.iso.datetime(),
  createdBy: z.string().nullable(),
  updatedAt: z.iso.datetime(),
  expiresAt: z.iso.datetime(),
};

/** GET …/imports: the open drafts of the workspace, last changed first. */
export const importList = z.strictObject({
  imports: z.array(
    z.strictObject({
      ...draftHead,
      files: z.array(z.strictObject({ name: z.string(), bytes: count })),
    }),
  ),
});
export type ImportList = z.infer<typeof importList>;

/** GET …/imports/:importId, and what POST and PATCH answer. */
export const importDraft = z.strictObject({
  ...draftHead,
  /** Counts the changes; saving names the version that was looked at. */
  version: z.number().int().positive(),
  files: z.array(importFile),
  choices: importChoices,
  guessed: importChoices,
  /** True where the choices were those last saved in this workspace for files with these columns. */
  remembered: z.boolean(),
  questions: z.array(importQuestion),
  found: importFound,
  /** At most LISTED_PROBLEMS; each names its file. */
  issues: z.array(issueSchema),
  issuesLeftOut: count,
  /** Whether it can be saved as it stands. */
  ready: z.boolean(),
  /** Null until there is a network. */
  growth: importGrowth.nullable(),
  estimate: importEstimate,
  saved: z.strictObject({ datasetId: z.uuid(), revisionId: z.uuid() }).nullable(),
});
export type ImportDraft = z.infer<typeof importDraft>;

/**
 * PATCH …/imports/:importId. `choices` whole, or null to go back to what was guessed. With hints and
 * without choices the columns are guessed anew.
 */
export const changeImportRequest = z.strictObject({
  name: z.string().trim().min(1, 'Give the import a name.').max(160).optional(),
  choices: importChoices.nullable().optional(),
  /** Replaces all that was said about these files. */
  hints: z
    .array(z.strictObject({ position: count, hint: sourceHint }))
    .max(IMPORT_LIMITS.files)
    .optional(),
});
export type ChangeImportRequest = z.infer<typeof changeImportRequest>;

/** GET …/imports/:importId/weights: how many edges each threshold keeps. */
export const importWeights = z.strictObject({
  /** Null without a network or a weight column. */
  weights: z
    .strictObject({
      nodes: count,
      /** Folded edges, before any threshold; those without a weight stay only without one. */
      edges: count,
      withoutWeight: count,
      /** Distinct weights rising, at most WEIGHT_STEPS (the least and the largest always); edges ≥ each. */
      steps: z.array(z.strictObject({ least: z.number(), edges: count })),
      /** Whether every distinct weight is among the steps. */
      complete: z.boolean(),
    })
    .nullable(),
});
export type ImportWeights = z.infer<typeof importWeights>;

/** POST …/imports/:importId/save: as a new dataset with a name, or as the next revision of one. */
export const saveImportRequest = z
  .strictObject({
    /** Of the draft that was looked at; 409 `imports.changed` if it has changed since. */
    version: z.number().int().positive(),
    name: createDatasetFields.shape.name.optional(),
    description: createDatasetFields.shape.description,
    datasetId: z.uuid().optional(),
  })
  .refine(({ name, datasetId }) => (name === undefined) !== (datasetId === undefined), {
    path: ['name'],
    message: 'Give a name for a new dataset, or the dataset that gets a revision.',
  });
export type SaveImportRequest = z.input<typeof saveImportRequest>;

/** Saving again answers the same. */
export const savedImport = z.strictObject({
  datasetId: z.uuid(),
  revisionId: z.uuid(),
  number: z.number().int().positive(),
});
export type SavedImport = z.infer<typeof savedImport>;
