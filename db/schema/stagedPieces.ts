import { integer, pgTable, primaryKey, uuid } from 'drizzle-orm/pg-core';
import { bytea } from './columns';

/** Bytes too many for one message, on their way to a column; gone when their transaction commits. */
export const stagedPieces = pgTable(
  'staged_pieces',
  {
    stage: uuid('stage').notNull(),
    /** 0, 1, … */
    piece: integer('piece').notNull(),
    content: bytea('content').notNull(),
  },
  (table) => [primaryKey({ name: 'staged_pieces_pk', columns: [table.stage, table.piece] })],
);
