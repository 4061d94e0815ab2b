import { bigserial, index, integer, jsonb, pgTable, uuid } from 'drizzle-orm/pg-core';
import { moment } from './columns';
import { outboxKindEnum } from './enums';

/**
 * What must be enqueued, written in the transaction that makes it necessary. The relay takes rows
 * with FOR UPDATE SKIP LOCKED, adds the job, and deletes the row. Payloads hold ids only.
 */
export const outbox = pgTable(
  'outbox',
  {
    id: bigserial('id', { mode: 'number' }).primaryKey(),
    kind: outboxKindEnum('kind').notNull(),
    /** Null for a `beat`. */
    workspaceId: uuid('workspace_id'),
    payload: jsonb('payload').notNull(),
    /** Names the job in the queue, so that relaying twice adds it once. */
    dispatchId: uuid('dispatch_id').notNull().defaultRandom(),
    tries: integer('tries').notNull().default(0),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (table) => [index('outbox_created').on(table.createdAt)],
);
