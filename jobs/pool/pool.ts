import { Piscina } from 'piscina';
import type { Outcome, ResultOf, Task } from './tasks';

export interface PoolOptions {
  /** The built script of jobs/pool/thread.ts. */
  readonly script: string;
  readonly threads: number;
  /** Megabytes of JavaScript heap of a thread; typed arrays are counted by the engine. */
  readonly heapMegabytes: number;
  readonly onError: (error: Error) => void;
}

export interface Pool {
  /**
   * Runs a task on the next free thread. When `signal` aborts, the task is told to stop; a thread
   * that does not obey within a second is ended and replaced.
   */
  run<K extends Task['kind']>(
    task: Omit<Extract<Task, { kind: K }>, 'control'>,
    signal: AbortSignal,
  ): Promise<Outcome<ResultOf<K>>>;
  close(): Promise<void>;
}

/** Milliseconds a task has to notice that it must stop. */
const PATIENCE = 1_000;

const codeOf = (error: Error): string =>
  'code' in error && typeof error.code === 'string' ? error.code : '';

/** Threads that the process owns; a dead one fails only the task it was at. */
export function openPool({ script, threads, heapMegabytes, onError }: PoolOptions): Pool {
  const piscina = new Piscina({
    filename: script,
    minThreads: threads,
    maxThreads: threads,
    atomics: 'disabled',
    resourceLimits: { maxOldGenerationSizeMb: heapMegabytes },
  });
  piscina.on('error', onError);

  return {
    async run(task, signal) {
      const control = new Int32Array(new SharedArrayBuffer(8));
      const ending = new AbortController();
      let timer: NodeJS.Timeout | undefined;
      const stop = () => {
        Atomics.store(control, 0, 1);
        timer = setTimeout(() => ending.abort(), PATIENCE);
      };
      if (signal.aborted) return { kind: 'stopped' };
      signal.addEventListener('abort', stop, { once: true });
      try {
        // What comes back was made by the thread script of the same build.
        return (await piscina.run({ ...task, control }, { signal: ending.signal })) as never;
      } catch (error) {
        if (ending.signal.aborted || signal.aborted) return { kind: 'stopped' };
        const lost = error instanceof Error ? error : new Error(String(error));
        onError(lost);
        const outOfMemory =
          codeOf(lost) === 'ERR_WORKER_OUT_OF_MEMORY' ||
          /array buffer allocation/i.test(lost.message);
        return { kind: 'crashed', outOfMemory, message: lost.message };
      } finally {
        clearTimeout(timer);
        signal.removeEventListener('abort', stop);
      }
    },
    close: () => piscina.destroy(),
  };
}
