import { integer, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { moment } from './columns';

/** Messages to people. `sentAt` stays null where no SMTP server is configured; `note` then says so. */
export const mails = pgTable('mails', {
  id: uuid('id').primaryKey().defaultRandom(),
  workspaceId: uuid('workspace_id').notNull(),
  recipient: text('recipient').notNull(),
  subject: text('subject').notNull(),
  body: text('body').notNull(),
  createdAt: moment('created_at').notNull().defaultNow(),
  tries: integer('tries').notNull().default(0),
  /** When the message last went to the outbox. */
  dispatchedAt: moment('dispatched_at').notNull().defaultNow(),
  sentAt: moment('sent_at'),
  note: text('note'),
});
