import { z } from 'zod';

/** Raised when the meaning of a payload changes; a worker refuses a version it does not know. */
const version = z.literal(1);
const id = z.uuid();
const attempt = z.number().int().positive();
const position = z.number().int().nonnegative();

/** Payloads by job name: ids only, at most 1 KB each. */
export const PAYLOADS = {
  /** Prepare a run, store its recorded barcode and its blocks. */
  plan: z.strictObject({ v: version, runId: id, attempt }),
  /** Compute one block of pairs. */
  block: z.strictObject({ v: version, runId: id, attempt, block: position }),
  /** Parent of the blocks: ends the run should the last block not have done so. */
  finish: z.strictObject({ v: version, runId: id, attempt }),
  /** Work one swap out in full, for somebody who waits. */
  pair: z.strictObject({ v: version, runId: id, p: position, q: position }),
  /** Count what the matrices of a revision would need, for somebody who waits. */
  estimate: z.strictObject({
    v: version,
    revisionId: id,
    maxDimension: z.number().int().min(0).max(3),
    /** Names the part; jobs of before parts had none. */
    partKey: z.string().max(100).default('whole'),
  }),
  /** Count what the matrix of a draft would need. */
  importEstimate: z.strictObject({
    v: version,
    importId: id,
    version: z.number().int().positive(),
  }),
  /** Send one message. */
  mail: z.strictObject({ v: version, mailId: id }),
  /** Show that jobs are consumed. */
  beat: z.strictObject({ v: version }),
} as const;

export type JobName = keyof typeof PAYLOADS;
export type Payload<N extends JobName> = z.infer<(typeof PAYLOADS)[N]>;

/** One job to be enqueued; `id` makes a repeat harmless while the first is there. */
export type JobRequest = {
  [N in JobName]: { readonly name: N; readonly id: string; readonly payload: Payload<N> };
}[JobName];

export const QUEUES = ['runs', 'blocks', 'pairs', 'notes'] as const;
export type QueueName = (typeof QUEUES)[number];

/** A click and a message never wait behind a matrix: each kind of work has its own queue. */
export const QUEUE_OF = {
  plan: 'runs',
  finish: 'runs',
  block: 'blocks',
  pair: 'pairs',
  estimate: 'pairs',
  importEstimate: 'pairs',
  mail: 'notes',
  beat: 'notes',
} as const satisfies Record<JobName, QueueName>;

export const isJobName = (name: string): name is JobName => Object.hasOwn(PAYLOADS, name);

/** Job ids hold no colon, begin with a dispatch id, and are never all digits. */
export const planJobId = (dispatchId: string): string => dispatchId;
export const finishJobId = (dispatchId: string): string => `${dispatchId}-finish`;
export const blockJobId = (dispatchId: string, block: number): string => `${dispatchId}-b${block}`;
