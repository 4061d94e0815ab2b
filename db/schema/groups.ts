import { foreignKey, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { moment } from './columns';
import { groupOriginEnum } from './enums';
import { runs } from './runs';
import { users } from './users';

export const groups = pgTable(
  'groups',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    workspaceId: uuid('workspace_id').notNull(),
    runId: uuid('run_id').notNull(),
    name: text('name').notNull(),
    /** Node ids as in nodes.csv, in row order. */
    nodeIds: text('node_ids').array().notNull(),
    origin: groupOriginEnum('origin').notNull(),
    note: text('note').notNull().default(''),
    createdBy: uuid('created_by').references(() => users.id, { onDelete: 'set null' }),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (table) => [
    foreignKey({
      columns: [table.workspaceId, table.runId],
      foreignColumns: [runs.workspaceId, runs.id],
    }).onDelete('cascade'),
    unique('groups_workspace_id').on(table.workspaceId, table.id),
  ],
);
