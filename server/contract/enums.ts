import { z } from 'zod';

/** What a member of a workspace may do is decided by the role, in contract/access.ts only. */
export const ROLES = ['owner', 'analyst', 'recorder', 'reviewer'] as const;
export const roleSchema = z.enum(ROLES);
export type Role = z.infer<typeof roleSchema>;

/** What the filtration is measured in: recorded values, or steps 1, 2, … (equal entries share one). */
export const SCALES = ['entry', 'rank'] as const;
export const scaleSchema = z.enum(SCALES);
export type Scale = z.infer<typeof scaleSchema>;

/** queued → running → done | failed | stopped. The last three are final. */
export const RUN_STATES = ['queued', 'running', 'done', 'failed', 'stopped'] as const;
export const runStateSchema = z.enum(RUN_STATES);
export type RunState = z.infer<typeof runStateSchema>;

/** The unit of an entry: a bare number, whole days (ISO dates), or seconds (ISO date-times, UTC). */
export const ENTRY_UNITS = ['number', 'days', 'seconds'] as const;
export const entryUnitSchema = z.enum(ENTRY_UNITS);
export type EntryUnit = z.infer<typeof entryUnitSchema>;

/** How a group came about. */
export const GROUP_ORIGINS = ['community', 'hand'] as const;
export const groupOriginSchema = z.enum(GROUP_ORIGINS);
export type GroupOrigin = z.infer<typeof groupOriginSchema>;

/** The highest homology dimension the engine computes. */
export const MAX_DIMENSION = 3;
