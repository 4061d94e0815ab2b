import { foreignKey, integer, jsonb, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { bytea, moment } from './columns';
import { datasets } from './datasets';
import { entryUnitEnum } from './enums';
import { users } from './users';

/** Immutable: a change of a network makes a new row. */
export const revisions = pgTable(
  'revisions',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    workspaceId: uuid('workspace_id').notNull(),
    datasetId: uuid('dataset_id').notNull(),
    /** 1, 2, … within the dataset. */
    number: integer('number').notNull(),
    /** SHA-256 (hexadecimal) of the canonical content. */
    contentHash: text('content_hash').notNull(),
    nodeCount: integer('node_count').notNull(),
    edgeCount: integer('edge_count').notNull(),
    entryUnit: entryUnitEnum('entry_unit').notNull(),
    /** Typed array u32[2 m]: node rows of the ends of each edge, lower row first, edges ascending. */
    edges: bytea('edges').notNull(),
    /** Typed array f64[m]: the weight of each edge, NaN for none; null where the network has none. */
    weights: bytea('weights'),
    /** Counts of what reading folded or passed over (contract: importReport). */
    report: jsonb('report').notNull(),
    createdBy: uuid('created_by').references(() => users.id, { onDelete: 'set null' }),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (table) => [
    foreignKey({
      columns: [table.workspaceId, table.datasetId],
      foreignColumns: [datasets.workspaceId, datasets.id],
    }).onDelete('cascade'),
    unique('revisions_workspace_id').on(table.workspaceId, table.id),
    unique('revisions_dataset_number').on(table.datasetId, table.number),
  ],
);
