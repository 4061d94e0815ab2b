import type { RunFocus, RunPart } from '#contract/enums';
import {
  doublePrecision,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  text,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { bytea, moment } from './columns';
import { runStateEnum, scaleEnum } from './enums';
import { revisions } from './revisions';
import { users } from './users';

export const runs = pgTable(
  'runs',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    workspaceId: uuid('workspace_id').notNull(),
    revisionId: uuid('revision_id').notNull(),
    /** 1, 2, … within the workspace. */
    number: integer('number').notNull(),
    scale: scaleEnum('scale').notNull(),
    /** Chosen dimensions, ascending; all dimensions up to the largest are computed. */
    dimensions: integer('dimensions').array().notNull(),
    /** Which pairs it covers; an extension makes it whole. */
    part: jsonb('part').$type<RunPart>().notNull().default({ kind: 'whole' }),
    /** What it covered before it was extended; null unless it was. */
    extendedFrom: jsonb('extended_from').$type<RunPart>(),
    /** Blocks and pairs of that earlier part: the blocks 0 .. blocks_before - 1. */
    blocksBefore: integer('blocks_before').notNull().default(0),
    pairsBefore: integer('pairs_before').notNull().default(0),
    /** What a reader looks at; blocks with those pairs go first. */
    focus: jsonb('focus').$type<RunFocus>(),
    /** Written by the plan; empty before. */
    engineVersion: text('engine_version').notNull().default(''),
    state: runStateEnum('state').notNull().default('queued'),
    /** Raised by every dispatch; each write of a worker is fenced by it. */
    attempt: integer('attempt').notNull().default(0),
    /** Names the jobs of the latest dispatch; a new one with every attempt. */
    dispatchId: uuid('dispatch_id').notNull().defaultRandom(),
    /** When that dispatch was asked for or, later, reached the queue. */
    dispatchedAt: moment('dispatched_at').notNull().defaultNow(),
    /** Pairs of the part; 0 until the plan has counted them, unless it is the whole. */
    pairsTotal: integer('pairs_total').notNull(),
    /** Null until the run is planned; then the number of rows in run_blocks. */
    blockCount: integer('block_count'),
    /** Blocks stored so far; also the id of the latest progress event. */
    blocksDone: integer('blocks_done').notNull().default(0),
    pairsDone: integer('pairs_done').notNull().default(0),
    /** Typed arrays: the barcode of the recorded order; written by the plan. */
    barcode: bytea('barcode'),
    /** Threads' seconds that stored blocks took; a run over the time allowed is failed by it. */
    secondsSpent: doublePrecision('seconds_spent').notNull().default(0),
    /** Moved forward by whoever works on the run. */
    heartbeatAt: moment('heartbeat_at'),
    failureCode: text('failure_code'),
    failureMessage: text('failure_message'),
    /** What was counted before the run (engine: Estimate). */
    estimate: jsonb('estimate'),
    idempotencyKey: text('idempotency_key'),
    requestedBy: uuid('requested_by').references(() => users.id, { onDelete: 'set null' }),
    createdAt: moment('created_at').notNull().defaultNow(),
    startedAt: moment('started_at'),
    finishedAt: moment('finished_at'),
  },
  (table) => [
    foreignKey({
      columns: [table.workspaceId, table.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }).onDelete('cascade'),
    unique('runs_workspace_id').on(table.workspaceId, table.id),
    unique('runs_workspace_number').on(table.workspaceId, table.number),
    uniqueIndex('runs_idempotency').on(table.workspaceId, table.requestedBy, table.idempotencyKey),
    index('runs_of_revision').on(table.revisionId),
    index('runs_unfinished').on(table.state, table.heartbeatAt),
  ],
);
