import { jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { moment } from './columns';
import { users } from './users';
import { workspaces } from './workspaces';

/** What was chosen when files with these columns were last saved. */
export const columnMemory = pgTable(
  'column_memory',
  {
    workspaceId: uuid('workspace_id')
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    /** SHA-256 (hexadecimal) of the sorted column names of both tables. */
    signature: text('signature').notNull(),
    /** Contract: importChoices. */
    choices: jsonb('choices').notNull(),
    updatedBy: uuid('updated_by').references(() => users.id, { onDelete: 'set null' }),
    updatedAt: moment('updated_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ name: 'column_memory_pk', columns: [table.workspaceId, table.signature] }),
  ],
);
