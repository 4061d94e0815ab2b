import { index, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { moment } from './columns';
import { users } from './users';

export const sessions = pgTable(
  'sessions',
  {
    /** SHA-256 (hexadecimal) of the secret in the cookie; the secret itself is never stored. */
    id: text('id').primaryKey(),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    /** Idle limit: moved forward while the session is used. */
    expiresAt: moment('expires_at').notNull(),
    /** The absolute limit counts from here. */
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (table) => [index('sessions_user').on(table.userId)],
);
