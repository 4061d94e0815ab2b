import { pgTable, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { moment } from './columns';

export const users = pgTable(
  'users',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    name: text('name').notNull(),
    /** As typed. */
    email: text('email').notNull(),
    /** Lower case, the key for signing in. */
    emailKey: text('email_key').notNull(),
    /** argon2id in PHC form. */
    passwordHash: text('password_hash').notNull(),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (table) => [uniqueIndex('users_email_key').on(table.emailKey)],
);
