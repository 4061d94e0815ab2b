import type { Db } from '../../db/client';
import type { Listener } from '../../db/listener';
import { listLanded } from '../../db/repositories/runBlocks';
import { findProgress, type RunProgress } from '../../db/repositories/runs';
import type { Scope } from '../../db/repositories/scope';

export interface Snapshot {
  /** Null once the run is gone. */
  readonly progress: RunProgress | null;
  /** Every stored block in the order in which they landed; at least what `progress` counts. */
  readonly landed: readonly number[];
}

/** Milliseconds in which several changes of a run are read once. */
const SETTLE = 100;
/** Milliseconds between looks, should a notification be lost. */
const POLL = 5_000;

/** One reading of a run per change, however many people watch it. */
export class RunWatches {
  readonly #watches = new Map<string, Watch>();

  constructor(
    private readonly db: Db,
    listener: Listener,
    private readonly onError: (error: Error) => void,
  ) {
    listener.subscribe('run_changed', (runId) => {
      for (const watch of this.#watches.values()) {
        if (runId === null || watch.runId === runId) watch.wake();
      }
    });
  }

  /**
   * @param scope of a reader who may see the run
   * @returns a function that ends the watching
   */
  watch(scope: Scope, runId: string, seen: (snapshot: Snapshot) => void): () => void {
    const watch = this.#watches.get(runId) ?? new Watch(this.db, scope, runId, this.onError);
    this.#watches.set(runId, watch);
    watch.join(seen);
    return () => {
      if (watch.leave(seen) > 0) return;
      watch.close();
      this.#watches.delete(runId);
    };
  }
}

class Watch {
  readonly #readers = new Set<(snapshot: Snapshot) => void>();
  readonly #poll: NodeJS.Timeout;
  #landed: number[] = [];
  #latest: Snapshot | null = null;
  #soon: NodeJS.Timeout | null = null;
  #reading = false;
  #again = false;

  constructor(
    private readonly db: Db,
    private readonly scope: Scope,
    readonly runId: string,
    private readonly onError: (error: Error) => void,
  ) {
    this.#poll = setInterval(() => this.wake(), POLL);
    void this.#read();
  }

  join(seen: (snapshot: Snapshot) => void): void {
    this.#readers.add(seen);
    if (this.#latest) seen(this.#latest);
  }

  leave(seen: (snapshot: Snapshot) => void): number {
    this.#readers.delete(seen);
    return this.#readers.size;
  }

  close(): void {
    clearInterval(this.#poll);
    if (this.#soon) clearTimeout(this.#soon);
  }

  wake(): void {
    this.#soon ??= setTimeout(() => {
      this.#soon = null;
      void this.#read();
    }, SETTLE);
  }

  async #read(): Promise<void> {
    if (this.#reading) {
      this.#again = true;
      return;
    }
    this.#reading = true;
    try {
      // The counters first: the blocks read after them are then never fewer.
      const progress = await findProgress(this.db, this.scope, this.runId);
      const fresh = await listLanded(this.db, this.scope, this.runId, this.#landed.length);
      this.#landed = [...this.#landed, ...fresh];
      this.#latest = { progress, landed: this.#landed };
      for (const seen of [...this.#readers]) seen(this.#latest);
    } catch (error) {
      // The next look tries again; readers keep what they have.
      this.onError(error instanceof Error ? error : new Error(String(error)));
    } finally {
      this.#reading = false;
      if (this.#again) {
        this.#again = false;
        this.wake();
      }
    }
  }
}
