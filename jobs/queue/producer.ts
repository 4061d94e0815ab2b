import { FlowProducer, Queue, type JobsOptions } from 'bullmq';
import { QUEUES, QUEUE_OF, type JobRequest, type QueueName } from './jobs';

export interface QueueConnection {
  readonly redisUrl: string;
  /** First part of every key, so that several instances may share a Redis. */
  readonly prefix: string;
  readonly onError: (error: Error) => void;
}

export interface Producer {
  add(job: JobRequest): Promise<void>;
  /** One flow: the parent becomes ready when every child has ended. */
  addFlow(parent: JobRequest, children: readonly JobRequest[]): Promise<void>;
  /** Puts waiting jobs before all others of their queue, the first of them first; others are passed over. */
  hurry(queue: QueueName, jobIds: readonly string[]): Promise<void>;
  /** BullMQ's word for where the job stands, `unknown` if there is none. */
  stateOf(queue: QueueName, jobId: string): Promise<string>;
  close(): Promise<void>;
}

/** Connects again and again until `closing` aborts: a process must be able to end while Redis is away. */
export const reconnecting = (url: string, closing: AbortSignal) => ({
  url,
  connectTimeout: 3_000,
  retryStrategy: (times: number) => (closing.aborted ? null : Math.min(1_000, 100 * times)),
});

/** Milliseconds after which Redis counts as away. */
const DEADLINE = 5_000;

const options = (job: JobRequest): JobsOptions => ({
  jobId: job.id,
  // Only faults of the infrastructure are thrown; the count that matters is the run's attempt.
  attempts: 5,
  backoff: { type: 'exponential', delay: 500 },
  removeOnComplete: true,
  removeOnFail: true,
  ignoreDependencyOnFailure: true,
});

const parts = (job: JobRequest) => ({
  name: job.name,
  data: job.payload,
  opts: options(job),
  queueName: QUEUE_OF[job.name],
});

async function withinDeadline<T>(work: Promise<T>): Promise<T> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(new Error('Redis did not answer within 5 s.')), DEADLINE);
  });
  try {
    return await Promise.race([work, late]);
  } finally {
    clearTimeout(timer);
    work.catch(() => undefined);
  }
}

/** Opens the queues for adding; used by the relay only. */
export function openProducer({ redisUrl, prefix, onError }: QueueConnection): Producer {
  const closing = new AbortController();
  const connection = {
    ...reconnecting(redisUrl, closing.signal),
    maxRetriesPerRequest: 1,
    enableOfflineQueue: false,
  };
  const queues = new Map<QueueName, Queue>(
    QUEUES.map((name) => [name, new Queue(name, { connection, prefix })]),
  );
  const flows = new FlowProducer({ connection, prefix });
  for (const queue of queues.values()) queue.on('error', onError);
  flows.on('error', onError);
  const queueOf = (name: QueueName): Queue => {
    const queue = queues.get(name);
    if (!queue) throw new Error(`No queue ${name}.`);
    return queue;
  };
  return {
    async add(job) {
      const { name, data, opts } = parts(job);
      await withinDeadline(queueOf(QUEUE_OF[job.name]).add(name, data, opts));
    },
    async addFlow(parent, children) {
      await withinDeadline(flows.add({ ...parts(parent), children: children.map(parts) }));
    },
    async hurry(name, jobIds) {
      const queue = queueOf(name);
      for (const jobId of [...jobIds].reverse()) {
        const job = await withinDeadline(queue.getJob(jobId));
        // One that was taken or is done meanwhile stays where it is.
        if (job && (await withinDeadline(job.getState())) === 'waiting') {
          await withinDeadline(job.changePriority({ priority: 0, lifo: true }));
        }
      }
    },
    stateOf: (queue, jobId) => withinDeadline(queueOf(queue).getJobState(jobId)),
    async close() {
      closing.abort();
      await Promise.allSettled([...queues.values(), flows].map((open) => open.close()));
    },
  };
}
