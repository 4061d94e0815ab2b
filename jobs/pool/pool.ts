import { Piscina } from 'piscina';
import { TableShelf } from './tableShelf';
import type { Asked, Outcome, ResultOf, Task } from './tasks';

export interface PoolOptions {
  /** The built script of jobs/pool/thread.ts. */
  readonly script: string;
  readonly threads: number;
  /** Megabytes of JavaScript heap of a thread; typed arrays are counted by the engine. */
  readonly heapMegabytes: number;
  readonly onError: (error: Error) => void;
  /** Shared by the pools of one process, so that tables are made once. */
  readonly shelf?: TableShelf;
}

/** A task without what the pool adds. */
type Bare<K extends Task['kind']> = Omit<Extract<Task, { kind: K }>, 'control' | 'tables'>;

export interface Pool {
  /**
   * Runs a task on the next free thread. When `signal` aborts, the task is told to stop; a thread
   * that does not obey within a second is ended and replaced.
   */
  run<K extends Asked>(task: Bare<K>, signal: AbortSignal): Promise<Outcome<ResultOf<K>>>;
  close(): Promise<void>;
}

/** Milliseconds a task has to notice that it must stop. */
const PATIENCE = 1_000;

const codeOf = (error: Error): string =>
  'code' in error && typeof error.code === 'string' ? error.code : '';

/** Threads that the process owns; a dead one fails only the task it was at. */
export function openPool(options: PoolOptions): Pool {
  const { script, threads, heapMegabytes, onError, shelf = new TableShelf() } = options;
  const piscina = new Piscina({
    filename: script,
    minThreads: threads,
    maxThreads: threads,
    atomics: 'disabled',
    resourceLimits: { maxOldGenerationSizeMb: heapMegabytes },
  });
  piscina.on('error', onError);

  return {
    async run<K extends Asked>(task: Bare<K>, signal: AbortSignal) {
      if (task.kind === 'estimate')
        return runOn(piscina, { ...task, tables: null }, signal, onError);
      const { subject } = task;
      const prepare = { kind: 'prepare', subject, tables: null } as const;
      const tables = await shelf.get(subject.key, signal, () =>
        runOn<'prepare'>(piscina, prepare, signal, onError),
      );
      if (tables.kind !== 'finished') return tables;
      return runOn(piscina, { ...task, tables: tables.result }, signal, onError);
    },
    close: () => piscina.destroy(),
  };
}

/** When `signal` aborts, the task is told to stop, and if it does not obey its thread is ended. */
async function runOn<K extends Task['kind']>(
  piscina: Piscina,
  task: object,
  signal: AbortSignal,
  onError: (error: Error) => void,
): Promise<Outcome<ResultOf<K>>> {
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
    return { kind: 'crashed', outOfMemory: isOutOfMemory(lost), message: lost.message };
  } finally {
    clearTimeout(timer);
    signal.removeEventListener('abort', stop);
  }
}

function isOutOfMemory(error: Error): boolean {
  return (
    codeOf(error) === 'ERR_WORKER_OUT_OF_MEMORY' || /array buffer allocation/i.test(error.message)
  );
}
