import { resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { Piscina } from 'piscina';
import type { Logger } from 'pino';
import { makeTurns } from '../http/turns';
import { readingTooLarge, readingTooSlow, tooManyReadings, wrongFiles } from './errors';
import type { ReadRequest, ReadOutcome, ReadNetwork } from './readMessages';

/** Megabytes of one thread's heap; what does not fit is refused, and only the thread dies. */
const HEAP = 1024;
/** Seconds that one reading may take. */
const TIME = 120;
const THREADS = 1;
const WAITING = 8;

export interface NetworkReader {
  /** @throws Failure `datasets.wrong_files` with everything that is wrong, or past a limit */
  read(request: ReadRequest): Promise<ReadNetwork>;
  close(): Promise<void>;
}

export interface ReaderOptions {
  /** The built parseThread script. */
  readonly script: string;
  readonly log: Logger;
  /** Megabytes of heap; 1024 unless told otherwise. */
  readonly heap?: number;
  /** Seconds; 120 unless told otherwise. */
  readonly time?: number;
}

/** Owns the thread that reads uploads; it starts with the first upload and goes when idle. */
export function makeNetworkReader(options: ReaderOptions): NetworkReader {
  const { script, log, heap = HEAP, time = TIME } = options;
  const pool = new Piscina<ReadRequest, ReadOutcome>({
    filename: pathToFileURL(resolve(script)).href,
    minThreads: 0,
    maxThreads: THREADS,
    idleTimeout: 10_000,
    resourceLimits: { maxOldGenerationSizeMb: heap },
  });
  // The time limit counts from the turn, not from the wait.
  const inTurn = makeTurns(THREADS, WAITING, tooManyReadings);
  pool.on('error', (error) => log.error({ err: error }, 'the reading thread failed'));
  return {
    read: async ({ nodesPath, edgesPath }) => {
      const outcome = await inTurn(() => run(pool, { nodesPath, edgesPath }, heap, time));
      if ('issues' in outcome) throw wrongFiles(outcome.issues, outcome.leftOut);
      return outcome;
    },
    close: () => pool.destroy(),
  };
}

async function run(
  pool: Piscina<ReadRequest, ReadOutcome>,
  request: ReadRequest,
  heap: number,
  time: number,
): Promise<ReadOutcome> {
  // Aborting ends the thread: a busy loop in it cannot go on.
  const limit = AbortSignal.timeout(time * 1000);
  try {
    return await pool.run(request, { signal: limit });
  } catch (error) {
    if (limit.aborted) throw readingTooSlow(time);
    throw outOfMemory(error) ? readingTooLarge(heap) : error;
  }
}

function outOfMemory(error: unknown): boolean {
  return error instanceof Error && 'code' in error && error.code === 'ERR_WORKER_OUT_OF_MEMORY';
}
