import { foreignKey, integer, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { moment } from './columns';
import { runs } from './runs';

/** Swaps that somebody asked to see in full; `detail` or `failure` is set when a worker has answered. */
export const pairDetails = pgTable(
  'pair_details',
  {
    workspaceId: uuid('workspace_id').notNull(),
    runId: uuid('run_id').notNull(),
    /** Arrival positions, p < q. */
    p: integer('p').notNull(),
    q: integer('q').notNull(),
    /** Engine: PairDetail with typed arrays as lists and Infinity as null. */
    detail: jsonb('detail'),
    failure: text('failure'),
    /** How often a worker has begun to answer; past a limit the answer is a failure. */
    tries: integer('tries').notNull().default(0),
    /** When the question last went to the outbox or reached the queue. */
    dispatchedAt: moment('dispatched_at').notNull().defaultNow(),
    askedAt: moment('asked_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.runId, table.p, table.q] }),
    foreignKey({
      columns: [table.workspaceId, table.runId],
      foreignColumns: [runs.workspaceId, runs.id],
    }).onDelete('cascade'),
  ],
);
