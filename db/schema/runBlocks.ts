import {
  doublePrecision,
  foreignKey,
  integer,
  pgTable,
  primaryKey,
  text,
  uuid,
} from 'drizzle-orm/pg-core';
import { bytea, moment } from './columns';
import { runs } from './runs';

/** The blocks of a run's plan; `result` is null until the block is computed. Unique by (run, block). */
export const runBlocks = pgTable(
  'run_blocks',
  {
    workspaceId: uuid('workspace_id').notNull(),
    runId: uuid('run_id').notNull(),
    block: integer('block').notNull(),
    pairs: integer('pairs').notNull(),
    /** Typed array u32: the arrival positions whose rows this block computes. */
    rows: bytea('rows').notNull(),
    /** Typed arrays u32 starts and partners (the engine's PairChoice); null for whole rows. */
    partners: bytea('partners'),
    /** Estimate of one thread's seconds. */
    cost: doublePrecision('cost').notNull().default(0),
    /** Typed arrays: f64 distances and i32 Betti-curve gaps (layout of the engine's PairResults). */
    result: bytea('result'),
    /** Its place in the order in which blocks landed, from 1. */
    landed: integer('landed'),
    /** The attempt that wrote the result. */
    attempt: integer('attempt'),
    /** Names the worker process that stored the result. */
    storedBy: text('stored_by'),
    finishedAt: moment('finished_at'),
  },
  (table) => [
    primaryKey({ columns: [table.runId, table.block] }),
    foreignKey({
      columns: [table.workspaceId, table.runId],
      foreignColumns: [runs.workspaceId, runs.id],
    }).onDelete('cascade'),
  ],
);
