import {
  boolean,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import { bytea, moment } from './columns';
import { datasets } from './datasets';
import { importStateEnum } from './enums';
import { revisions } from './revisions';
import { users } from './users';
import { workspaces } from './workspaces';

/** A network on its way in: a draft that can be left and resumed, then saved as a revision. */
export const imports = pgTable(
  'imports',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    workspaceId: uuid('workspace_id')
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    name: text('name').notNull(),
    state: importStateEnum('state').notNull().default('open'),
    /** The dataset that is to get a revision; null for a new dataset. */
    datasetId: uuid('dataset_id'),
    /** The revision that came of it; the files stay beside it as what came in. */
    revisionId: uuid('revision_id'),
    /** Counts the changes of files, hints and choices; every write of a reading is fenced by it. */
    version: integer('version').notNull().default(1),
    /** Contract: importChoices; null for what is guessed or remembered. */
    choices: jsonb('choices'),
    /** Of the version that `view` shows; null before the first reading. */
    readVersion: integer('read_version'),
    /** What the reading found, as server/imports/readMessages.ts lays it out. */
    view: jsonb('view'),
    /** How many edges each weight keeps (contract: importWeights), or null. */
    weights: jsonb('weights'),
    createdBy: uuid('created_by').references(() => users.id, { onDelete: 'set null' }),
    createdAt: moment('created_at').notNull().defaultNow(),
    updatedAt: moment('updated_at').notNull().defaultNow(),
    /** Open drafts past this moment are removed. */
    expiresAt: moment('expires_at').notNull(),
  },
  (table) => [
    foreignKey({
      columns: [table.workspaceId, table.datasetId],
      foreignColumns: [datasets.workspaceId, datasets.id],
    }).onDelete('cascade'),
    foreignKey({
      columns: [table.workspaceId, table.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }).onDelete('cascade'),
    unique('imports_workspace_id').on(table.workspaceId, table.id),
    index('imports_expires').on(table.expiresAt),
  ],
);

/** The files of an import, in the order sent. */
export const importFiles = pgTable(
  'import_files',
  {
    workspaceId: uuid('workspace_id').notNull(),
    importId: uuid('import_id').notNull(),
    position: integer('position').notNull(),
    /** As sent, without folders and control characters; each once in an import. */
    name: text('name').notNull(),
    /** How many. */
    bytes: integer('bytes').notNull(),
    pasted: boolean('pasted').notNull(),
    /** Contract: sourceHint. */
    hint: jsonb('hint').notNull().default({}),
  },
  (table) => [
    primaryKey({ name: 'import_files_pk', columns: [table.importId, table.position] }),
    unique('import_files_workspace').on(table.workspaceId, table.importId, table.position),
    foreignKey({
      name: 'import_files_import',
      columns: [table.workspaceId, table.importId],
      foreignColumns: [imports.workspaceId, imports.id],
    }).onDelete('cascade'),
  ],
);

/** The bytes of a file in pieces: no process ever holds a whole file. */
export const importPieces = pgTable(
  'import_pieces',
  {
    workspaceId: uuid('workspace_id').notNull(),
    importId: uuid('import_id').notNull(),
    position: integer('position').notNull(),
    /** 0, 1, … */
    piece: integer('piece').notNull(),
    content: bytea('content').notNull(),
  },
  (table) => [
    primaryKey({
      name: 'import_pieces_pk',
      columns: [table.importId, table.position, table.piece],
    }),
    foreignKey({
      name: 'import_pieces_file',
      columns: [table.workspaceId, table.importId, table.position],
      foreignColumns: [importFiles.workspaceId, importFiles.importId, importFiles.position],
    }).onDelete('cascade'),
  ],
);
