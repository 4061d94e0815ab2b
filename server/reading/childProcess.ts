import { fork, type ChildProcess } from 'node:child_process';
import { readFile } from 'node:fs/promises';
import type { Logger } from 'pino';
import { readingBroken, readingTooLarge, readingTooSlow } from './errors';
import type { ReadAnswer, ReadRequest } from './messages';

export interface ReadingLimits {
  /** Megabytes of heap. */
  readonly heap: number;
  /** Megabytes in all. */
  readonly resident: number;
  /** Seconds. */
  readonly time: number;
}

/** Milliseconds between looks at the memory of the process. */
const LOOK = 200;
/** Bytes of a page in /proc/<pid>/statm. */
const PAGE = 4096;
const MEGABYTE = 1024 * 1024;
/** Characters kept of what the process says before it ends. */
const LAST_WORDS = 4000;

/**
 * Runs one request in a process of its own, which is ended when it passes a limit. It gets neither
 * the settings nor the connections of the server.
 *
 * @throws Failure past a limit, or where the process ended without an answer
 */
export async function runChild(
  script: string,
  request: ReadRequest,
  limits: ReadingLimits,
  log: Logger,
  closing: AbortSignal,
): Promise<ReadAnswer> {
  closing.throwIfAborted();
  const child = fork(script, [], {
    execArgv: [`--max-old-space-size=${limits.heap}`],
    serialization: 'advanced',
    stdio: ['ignore', 'ignore', 'pipe', 'ipc'],
    env: {},
  });
  const watch = watchOver(child, limits, closing);
  const words = lastWords(child);
  const ended = endOf(child);
  try {
    const answered = answerOf(child);
    child.send(request, () => undefined);
    const answer = await Promise.race([answered, ended.then(() => null)]);
    if (answer !== null) return answer;
    if (watch.broke === 'time') throw readingTooSlow(limits.time);
    const heapFull = words().includes('heap out of memory');
    if (watch.broke === 'memory' || heapFull) throw readingTooLarge(limits.heap);
    if (!closing.aborted) log.error({ words: words() }, 'the reading process ended by itself');
    throw readingBroken();
  } finally {
    watch.stop();
    child.kill('SIGKILL');
    await ended;
  }
}

function isAnswer(message: unknown): message is ReadAnswer {
  return typeof message === 'object' && message !== null && 'kind' in message;
}

const answerOf = (child: ChildProcess): Promise<ReadAnswer> =>
  new Promise((resolve, reject) => {
    child.once('message', (message: unknown) => {
      if (isAnswer(message)) resolve(message);
      else reject(new Error('The reading process sent something else than an answer.'));
    });
  });

/** Resolves once the process is gone, or could not be started. */
const endOf = (child: ChildProcess): Promise<void> =>
  new Promise((resolve) => {
    child.once('exit', () => resolve());
    child.once('error', () => {
      if (child.pid === undefined) resolve();
    });
  });

/** @returns what the process wrote last on its error stream. */
function lastWords(child: ChildProcess): () => string {
  let words = '';
  child.stderr?.on('data', (chunk: Buffer) => {
    words = (words + chunk.toString()).slice(-LAST_WORDS);
  });
  return () => words;
}

interface Watch {
  broke: 'time' | 'memory' | null;
  stop(): void;
}

function watchOver(child: ChildProcess, limits: ReadingLimits, closing: AbortSignal): Watch {
  const end = () => child.kill('SIGKILL');
  const breaking = (what: 'time' | 'memory') => {
    watch.broke ??= what;
    end();
  };
  const clock = setTimeout(() => breaking('time'), limits.time * 1000);
  const look = setInterval(() => {
    void residentMegabytes(child.pid).then((held) => {
      if (held > limits.resident) breaking('memory');
    });
  }, LOOK);
  closing.addEventListener('abort', end);
  const watch: Watch = {
    broke: null,
    stop: () => {
      clearTimeout(clock);
      clearInterval(look);
      closing.removeEventListener('abort', end);
    },
  };
  return watch;
}

/** @returns what the process holds, or 0 where the system does not say. */
async function residentMegabytes(pid: number | undefined): Promise<number> {
  const statm = await readFile(`/proc/${pid}/statm`, 'utf8').catch(() => '');
  return (Number(statm.split(' ')[1] ?? 0) * PAGE) / MEGABYTE;
}
