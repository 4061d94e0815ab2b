import { pgTable, text } from 'drizzle-orm/pg-core';
import { moment } from './columns';

/** When something last showed that it works: `queue` is moved forward by consuming a `beat` job. */
export const beats = pgTable('beats', {
  name: text('name').primaryKey(),
  /** Of the worker that consumed it: what a run that is started now will be computed with. */
  engineVersion: text('engine_version'),
  consumedAt: moment('consumed_at').notNull().defaultNow(),
});
