import { z } from 'zod';
import { runStateSchema } from './enums';

/**
 * GET …/runs/:run/events: server-sent events named `progress`. The event id is the number of blocks
 * stored so far; a reconnect with Last-Event-ID receives at once what it missed. After a final state
 * the stream ends.
 */
export const progressEvent = z.strictObject({
  runId: z.uuid(),
  state: runStateSchema,
  pairsDone: z.number().int(),
  pairsTotal: z.number().int(),
  blockCount: z.number().int(),
  /** Blocks stored since the last event this listener has seen. */
  blocks: z.array(z.number().int()),
  /** Estimate from the pairs per second so far; null until there is one. */
  millisecondsLeft: z.number().int().nullable(),
  failure: z.strictObject({ code: z.string(), message: z.string() }).nullable(),
});
export type ProgressEvent = z.infer<typeof progressEvent>;
