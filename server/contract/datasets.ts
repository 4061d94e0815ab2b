import { z } from 'zod';
import { importChoices, importFound, SOURCE_FORMATS, textReading } from './importChoices';
import { entryUnitSchema, runPartSchema, runStateSchema, scaleSchema } from './enums';
import { revisionOrigin } from './revisions';

export const UPLOAD_LIMITS = {
  /** Bytes of one file. */
  fileBytes: 50 * 1024 * 1024,
  nodes: 5_000,
  edgeRows: 2_000_000,
  /** Characters of one line. */
  lineCharacters: 1_000_000,
  /** Characters of an id or a label. */
  labelCharacters: 300,
} as const;

/** Text fields of the multipart form beside the files `nodes` and `edges`. */
export const createDatasetFields = z.strictObject({
  name: z.string().trim().min(1, 'Give the dataset a name.').max(160),
  description: z.string().trim().max(2000).default(''),
});
export type CreateDatasetFields = z.infer<typeof createDatasetFields>;

/** What reading the two files found and folded; nothing is folded in silence. */
export const importReport = z.strictObject({
  nodeRows: z.number().int(),
  edgeRows: z.number().int(),
  selfLoops: z.number().int(),
  duplicateEdges: z.number().int(),
  /** Rows that repeat an edge with source and target exchanged. */
  reversedEdges: z.number().int(),
  /** Nodes that share their entry with another node. */
  tiedNodes: z.number().int(),
  repeatedLabels: z.number().int(),
  isolatedNodes: z.number().int(),
  components: z.number().int(),
  /** Columns that were read past, e.g. `nodes.csv: habitat`. */
  ignoredColumns: z.array(z.string()),
  /** What was chosen and found where the network came by a guided import. */
  imported: z
    .strictObject({
      files: z.array(
        z.strictObject({
          name: z.string(),
          bytes: z.number().int(),
          format: z.enum(SOURCE_FORMATS).nullable(),
          reading: textReading.nullable(),
        }),
      ),
      choices: importChoices,
      found: importFound,
    })
    .optional(),
  /** How the revision was made from another of its dataset, where it was. */
  origin: revisionOrigin.optional(),
});
export type ImportReport = z.infer<typeof importReport>;

export const revisionSummary = z.strictObject({
  id: z.uuid(),
  datasetId: z.uuid(),
  number: z.number().int().positive(),
  /** SHA-256 of the canonical content, hexadecimal. */
  contentHash: z.string(),
  nodeCount: z.number().int(),
  edgeCount: z.number().int(),
  entryUnit: entryUnitSchema,
  createdAt: z.iso.datetime(),
  createdBy: z.string().nullable(),
  report: importReport,
});
export type RevisionSummary = z.infer<typeof revisionSummary>;

export const runBrief = z.strictObject({
  id: z.uuid(),
  number: z.number().int().positive(),
  revisionNumber: z.number().int().positive(),
  scale: scaleSchema,
  dimensions: z.array(z.number().int()),
  part: runPartSchema,
  state: runStateSchema,
  createdAt: z.iso.datetime(),
});
export type RunBrief = z.infer<typeof runBrief>;

export const dataset = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  description: z.string(),
  /** True for demo data: invented, and labelled so everywhere. */
  invented: z.boolean(),
  createdAt: z.iso.datetime(),
  /** Since when it is out of the list; null if it is in it. */
  archivedAt: z.iso.datetime().nullable(),
  revisions: z.array(revisionSummary),
  /** Newest first. */
  runs: z.array(runBrief),
});
export type Dataset = z.infer<typeof dataset>;
export const datasetList = z.strictObject({ datasets: z.array(dataset) });

/** Query of the list. */
export const datasetsQuery = z.strictObject({
  archived: z.enum(['hidden', 'shown']).default('hidden'),
});

/** Deleted datasets that can be restored, latest first. */
export const deletedDatasetList = z.strictObject({
  datasets: z.array(
    z.strictObject({
      id: z.uuid(),
      name: z.string(),
      invented: z.boolean(),
      deletedAt: z.iso.datetime(),
      restorableUntil: z.iso.datetime(),
    }),
  ),
});
export type DeletedDatasetList = z.infer<typeof deletedDatasetList>;

/** The name of the dataset, typed as it is. */
export const purgeDatasetRequest = z.strictObject({ name: z.string().max(160) });

/** One node of a revision, in the row order of nodes.csv. */
export const revisionNode = z.strictObject({
  id: z.string(),
  label: z.string(),
  /** As written in the file. */
  entryRaw: z.string(),
  /** In the revision's entry unit; days and seconds count from 1970-01-01 UTC. */
  entry: z.number(),
  /** As written; empty where nothing was, even if the end of the window is known. */
  earliestRaw: z.string(),
  earliest: z.number().nullable(),
  latestRaw: z.string(),
  latest: z.number().nullable(),
});
export type RevisionNode = z.infer<typeof revisionNode>;

export const revision = revisionSummary.extend({
  datasetName: z.string(),
  invented: z.boolean(),
  nodes: z.array(revisionNode),
  /** Pairs of node rows. */
  edges: z.array(z.tuple([z.number().int(), z.number().int()])),
});
export type Revision = z.infer<typeof revision>;
