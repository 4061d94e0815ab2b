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

/** A draft is open until it is saved as a revision. */
export const IMPORT_STATES = ['open', 'saved'] as const;
export const importStateSchema = z.enum(IMPORT_STATES);
export type ImportState = z.infer<typeof importStateSchema>;

/** How a group came about. */
export const GROUP_ORIGINS = ['community', 'hand'] as const;
export const groupOriginSchema = z.enum(GROUP_ORIGINS);
export type GroupOrigin = z.infer<typeof groupOriginSchema>;

/** The highest homology dimension the engine computes. */
export const MAX_DIMENSION = 3;

/** What a chosen part may name; more is a longer address than servers take. */
export const CHOSEN_LIMITS = { windows: 20, nodes: 100, pairs: 200 } as const;

const place = z.number().int().nonnegative();

/**
 * Which pairs a run covers: all, those at most so many arrival positions apart, those whose entry
 * intervals [earliest, latest] overlap, or chosen ones. Windows are first and last arrival position
 * (0 = first to arrive); nodes and pairs are node rows.
 */
export const runPartSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('whole') }),
  z.strictObject({ kind: z.literal('within'), positions: z.number().int().min(1).max(1_000_000) }),
  z.strictObject({ kind: z.literal('overlapping') }),
  z.strictObject({
    kind: z.literal('chosen'),
    windows: z
      .array(
        z
          .tuple([place, place])
          .refine(([from, to]) => from < to, 'A window needs a first and a later last position.'),
      )
      .max(CHOSEN_LIMITS.windows)
      .default([]),
    nodes: z.array(place).max(CHOSEN_LIMITS.nodes).default([]),
    pairs: z
      .array(z.tuple([place, place]).refine(([a, b]) => a !== b, 'A pair needs two nodes.'))
      .max(CHOSEN_LIMITS.pairs)
      .default([]),
  }),
]);
export type RunPart = z.infer<typeof runPartSchema>;
export const WHOLE: RunPart = { kind: 'whole' };

/** What a reader looks at while a run goes, in arrival positions; those pairs are computed first. */
export type RunFocus =
  | { readonly kind: 'node'; readonly p: number }
  | { readonly kind: 'pair'; readonly p: number; readonly q: number }
  | { readonly kind: 'window'; readonly from: number; readonly to: number };
