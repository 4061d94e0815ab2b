import { boolean, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { moment } from './columns';
import { users } from './users';
import { workspaces } from './workspaces';

export const datasets = pgTable(
  'datasets',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    workspaceId: uuid('workspace_id')
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    name: text('name').notNull(),
    description: text('description').notNull().default(''),
    /** Demo data: invented, and labelled so wherever it is shown. */
    invented: boolean('invented').notNull().default(false),
    createdBy: uuid('created_by').references(() => users.id, { onDelete: 'set null' }),
    createdAt: moment('created_at').notNull().defaultNow(),
    /** Out of the list, readable by address. */
    archivedAt: moment('archived_at'),
    /** Not found since; purged 30 days later. */
    deletedAt: moment('deleted_at'),
  },
  (table) => [unique('datasets_workspace_id').on(table.workspaceId, table.id)],
);
