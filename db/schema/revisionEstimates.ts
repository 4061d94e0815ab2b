import { foreignKey, integer, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import type { RunPart } from '#contract/enums';
import { moment } from './columns';
import { revisions } from './revisions';

/**
 * What a run of a revision would need, by highest dimension and part; `estimate` or `failure` is set when a
 * worker has answered.
 */
export const revisionEstimates = pgTable(
  'revision_estimates',
  {
    workspaceId: uuid('workspace_id').notNull(),
    revisionId: uuid('revision_id').notNull(),
    /** D, 0..3. */
    maxDimension: integer('max_dimension').notNull(),
    /** Names the part: the same key always means the same pairs. */
    partKey: text('part_key').notNull(),
    part: jsonb('part').$type<RunPart>().notNull(),
    /** Contract: runEstimate without `maxDimension`, `part` and `refusal`. */
    estimate: jsonb('estimate'),
    failure: text('failure'),
    /** How often a worker has begun to answer; past a limit the answer is a failure. */
    tries: integer('tries').notNull().default(0),
    /** When the question last went to the outbox or reached the queue. */
    dispatchedAt: moment('dispatched_at').notNull().defaultNow(),
    askedAt: moment('asked_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({
      name: 'revision_estimates_pk',
      columns: [table.workspaceId, table.revisionId, table.maxDimension, table.partKey],
    }),
    foreignKey({
      columns: [table.workspaceId, table.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }).onDelete('cascade'),
  ],
);
