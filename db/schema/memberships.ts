import { index, pgTable, primaryKey, uuid } from 'drizzle-orm/pg-core';
import { moment } from './columns';
import { roleEnum } from './enums';
import { users } from './users';
import { workspaces } from './workspaces';

export const memberships = pgTable(
  'memberships',
  {
    workspaceId: uuid('workspace_id')
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    role: roleEnum('role').notNull(),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.workspaceId, table.userId] }),
    index('memberships_user').on(table.userId),
  ],
);
