import { pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { moment } from './columns';

export const workspaces = pgTable('workspaces', {
  id: uuid('id').primaryKey().defaultRandom(),
  name: text('name').notNull(),
  createdAt: moment('created_at').notNull().defaultNow(),
});
