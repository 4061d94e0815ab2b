import type { PreparedData } from '../engine/index';
import type { Outcome } from './tasks';

/** Networks whose tables are kept. Two runs at a time share a process well. */
const MOST_KEPT = 2;

type Prepared = Outcome<PreparedData>;

/**
 * The tables of the runs that this process works on: made once, by whichever thread is free, and
 * read by all of them from shared memory.
 */
export class TableShelf {
  /** By key of the subject, the latest used last; also while they are being made. */
  private readonly kept = new Map<string, Promise<Prepared>>();

  /**
   * @param make prepares the tables; called by one asker at a time
   * @returns the tables, or why there are none; an asker whose maker was stopped or died tries itself
   */
  async get(key: string, signal: AbortSignal, make: () => Promise<Prepared>): Promise<Prepared> {
    for (;;) {
      const found = this.kept.get(key);
      if (!found) return this.make(key, make);
      this.kept.delete(key);
      this.kept.set(key, found);
      const outcome = await Promise.race([found, aborted(signal)]);
      if (outcome === null) return { kind: 'stopped' };
      if (outcome.kind !== 'stopped' && outcome.kind !== 'crashed') return outcome;
    }
  }

  private async make(key: string, make: () => Promise<Prepared>): Promise<Prepared> {
    const making = make();
    while (this.kept.size >= MOST_KEPT) this.kept.delete(this.kept.keys().next().value ?? '');
    this.kept.set(key, making);
    let outcome: Prepared | undefined;
    try {
      outcome = await making;
      return outcome;
    } finally {
      if (outcome?.kind !== 'finished' && this.kept.get(key) === making) this.kept.delete(key);
    }
  }
}

/** Null once the signal has aborted. */
function aborted(signal: AbortSignal): Promise<null> {
  if (signal.aborted) return Promise.resolve(null);
  return new Promise((resolve) =>
    signal.addEventListener('abort', () => resolve(null), { once: true }),
  );
}
