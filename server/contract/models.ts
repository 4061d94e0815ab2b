import { z } from 'zod';
import { createDatasetFields } from './datasets';

const parameter = z.strictObject({
  name: z.string(),
  label: z.string(),
  /** What it does, in a sentence. */
  meaning: z.string(),
  /** Smallest and largest value, both allowed. */
  least: z.number(),
  most: z.number(),
  whole: z.boolean(),
  standard: z.number(),
});
export type ModelParameter = z.infer<typeof parameter>;

const growthModel = z.strictObject({
  name: z.string(),
  title: z.string(),
  /** The rule by which a node is joined to earlier ones. */
  rule: z.string(),
  /** Author, year, where published. */
  source: z.string(),
  parameters: z.array(parameter),
});
export type GrowthModelEntry = z.infer<typeof growthModel>;

/** The models of growth, from the plainest on, and the largest values that all of them allow. */
export const growthModelList = z.strictObject({
  models: z.array(growthModel),
  limits: z.strictObject({
    nodes: z.number().int(),
    edges: z.number().int(),
    seed: z.number().int(),
  }),
});
export type GrowthModelList = z.infer<typeof growthModelList>;

/** What is to be grown; ranges are the model's, and are named by field where they are broken. */
export const growDatasetRequest = z.strictObject({
  model: z.string('Choose a model.').max(100),
  nodeCount: z.number('Give a number.'),
  /** By name; one that is left out takes its standard value. */
  parameters: z.record(z.string().max(100), z.number('Give a number.')).default({}),
  /** The same seed gives the same network. */
  seed: z.number('Give a number.'),
  name: createDatasetFields.shape.name,
});
export type GrowDatasetRequest = z.infer<typeof growDatasetRequest>;
