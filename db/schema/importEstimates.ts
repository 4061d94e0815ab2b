import { foreignKey, integer, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { bytea, moment } from './columns';
import { imports } from './imports';

/** The network of a draft, for the worker that counts its cliques; the newest version alone. */
export const importEstimates = pgTable(
  'import_estimates',
  {
    workspaceId: uuid('workspace_id').notNull(),
    importId: uuid('import_id').notNull(),
    /** Of the draft; an answer to an older one is not written. */
    version: integer('version').notNull(),
    /** Typed array f64[n]: entries in node row order. */
    entries: bytea('entries').notNull(),
    /** Typed array u32[2 m], as in revisions.edges. */
    edges: bytea('edges').notNull(),
    /** Contract: importEstimate of state `ready`, without the state. */
    estimate: jsonb('estimate'),
    failure: text('failure'),
    /** How often a worker has begun to answer; past a limit the answer is a failure. */
    tries: integer('tries').notNull().default(0),
    /** When the question last went to the outbox or reached the queue. */
    dispatchedAt: moment('dispatched_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ name: 'import_estimates_pk', columns: [table.importId] }),
    foreignKey({
      name: 'import_estimates_import',
      columns: [table.workspaceId, table.importId],
      foreignColumns: [imports.workspaceId, imports.id],
    }).onDelete('cascade'),
  ],
);
