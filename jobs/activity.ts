import type { Db } from '../db/client';
import type { Listener } from '../db/listener';
import { heartbeat } from '../db/repositories/runDispatch';
import type { Fence } from '../db/repositories/runWork';
import { Handover } from './queue/consumer';

/** Milliseconds between heartbeats. */
const BEAT = 2_500;
/** Milliseconds in which several changes of the same runs are looked at once. */
const SETTLE = 50;

interface Work extends Fence {
  readonly ending: AbortController;
}

/**
 * What this process works on. Moves the heartbeats of its runs forward and aborts the work of a run
 * that was stopped, failed, deleted or taken over.
 */
export class Activity {
  readonly #works = new Set<Work>();
  readonly #timer: NodeJS.Timeout;
  readonly #unsubscribe: () => void;
  #soon: NodeJS.Timeout | null = null;
  readonly #closing = new AbortController();

  constructor(
    private readonly db: Db,
    listener: Listener,
    private readonly onError: (error: Error) => void,
  ) {
    this.#timer = setInterval(() => void this.#check(), BEAT);
    this.#unsubscribe = listener.subscribe('run_changed', (runId) => {
      if ([...this.#works].some((work) => runId === null || work.runId === runId)) this.#wake();
    });
  }

  /** Aborts when this process hands its work over. */
  get closing(): AbortSignal {
    return this.#closing.signal;
  }

  /** Runs `work` with a signal that aborts when the run may not go on here. */
  async during<T>(fence: Fence, work: (signal: AbortSignal) => Promise<T>): Promise<T> {
    if (this.#closing.signal.aborted) throw new Handover();
    const entry: Work = { ...fence, ending: new AbortController() };
    this.#works.add(entry);
    // The run may have ended between its claim and this moment, when nobody here was listening.
    this.#wake();
    try {
      return await work(entry.ending.signal);
    } finally {
      this.#works.delete(entry);
    }
  }

  /** After an abort: hands the job over if this process closes; otherwise there is nothing left to do. */
  handOverIfClosing(): void {
    if (this.#closing.signal.aborted) throw new Handover();
  }

  /** Aborts everything, for another process to take over. */
  handOver(): void {
    this.#closing.abort();
    clearInterval(this.#timer);
    if (this.#soon) clearTimeout(this.#soon);
    this.#unsubscribe();
    for (const { ending } of this.#works) ending.abort();
  }

  #wake(): void {
    this.#soon ??= setTimeout(() => {
      this.#soon = null;
      void this.#check();
    }, SETTLE);
  }

  async #check(): Promise<void> {
    const works = [...this.#works];
    try {
      const alive = await heartbeat(this.db, works);
      for (const work of works) {
        const goesOn = alive.some(
          ({ runId, attempt }) => runId === work.runId && attempt === work.attempt,
        );
        if (!goesOn) work.ending.abort();
      }
    } catch (error) {
      this.onError(error instanceof Error ? error : new Error(String(error)));
    }
  }
}
