import {
  doublePrecision,
  foreignKey,
  integer,
  pgTable,
  primaryKey,
  text,
  uuid,
} from 'drizzle-orm/pg-core';
import { revisions } from './revisions';

/** The nodes of a revision, one row each, in the order of the uploaded file. */
export const revisionNodes = pgTable(
  'revision_nodes',
  {
    workspaceId: uuid('workspace_id').notNull(),
    revisionId: uuid('revision_id').notNull(),
    /** 0 .. n - 1; edges and groups name nodes by it. */
    row: integer('row').notNull(),
    nodeId: text('node_id').notNull(),
    label: text('label').notNull(),
    entryRaw: text('entry_raw').notNull(),
    entry: doublePrecision('entry').notNull(),
    earliestRaw: text('earliest_raw').notNull().default(''),
    earliest: doublePrecision('earliest'),
    latestRaw: text('latest_raw').notNull().default(''),
    latest: doublePrecision('latest'),
  },
  (table) => [
    primaryKey({ columns: [table.revisionId, table.row] }),
    foreignKey({
      columns: [table.workspaceId, table.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }).onDelete('cascade'),
  ],
);
