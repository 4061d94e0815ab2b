import { UnrecoverableError, WaitingError, Worker, type Job } from 'bullmq';
import { PAYLOADS, isJobName, type JobName, type Payload, type QueueName } from './jobs';
import { reconnecting, type QueueConnection } from './producer';

/** Name → what is done with the parsed payload; exhaustive at compile time. */
export type Handlers = { readonly [N in JobName]: (payload: Payload<N>) => Promise<void> };

/** Thrown by a handler whose process is closing: the job goes back to the front of its queue. */
export class Handover extends Error {
  override readonly name = 'Handover';
}

export interface Consumer {
  /** Takes no further jobs and waits for those at work. */
  close(): Promise<void>;
}

async function handle<N extends JobName>(
  name: N,
  data: unknown,
  handlers: Handlers,
): Promise<void> {
  const payload = PAYLOADS[name].safeParse(data);
  if (!payload.success) {
    throw new UnrecoverableError(`A ${name} job has a payload this worker does not know.`);
  }
  // TypeScript cannot see that the schema and the handler of one name belong together.
  const handler = handlers[name] as (parsed: typeof payload.data) => Promise<void>;
  await handler(payload.data);
}

async function process(job: Job, token: string | undefined, handlers: Handlers): Promise<void> {
  if (!isJobName(job.name)) throw new UnrecoverableError(`No handler for ${job.name} jobs.`);
  try {
    await handle(job.name, job.data, handlers);
  } catch (error) {
    if (!(error instanceof Handover)) throw error;
    await job.moveToWait(token);
    throw new WaitingError();
  }
}

/** Begins to take jobs of one queue. */
export function openConsumer(
  queue: QueueName,
  concurrency: number,
  handlers: Handlers,
  { redisUrl, prefix, onError }: QueueConnection,
): Consumer {
  const closing = new AbortController();
  const worker = new Worker(queue, (job, token) => process(job, token, handlers), {
    connection: { ...reconnecting(redisUrl, closing.signal), maxRetriesPerRequest: null },
    prefix,
    concurrency,
    // A killed worker's job is taken up again 10 to 15 s later; heartbeats are usually faster.
    lockDuration: 10_000,
    stalledInterval: 5_000,
    maxStalledCount: 5,
    drainDelay: 5,
    removeOnComplete: { count: 0 },
    removeOnFail: { count: 0 },
  });
  worker.on('error', onError);
  worker.on('failed', (_job, error) => onError(error));
  return {
    close() {
      closing.abort();
      return worker.close();
    },
  };
}
