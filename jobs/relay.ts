import type { Db } from '../db/client';
import type { Listener } from '../db/listener';
import { takeFromOutbox, type OutboxRow } from '../db/repositories/outbox';
import { decodeBlockPairs } from '../db/codecs/blockPairs';
import { listMissing, listMissingPairs } from '../db/repositories/runBlocks';
import { findDispatch, findFocus, markDispatched } from '../db/repositories/runDispatch';
import { blocksInFocus } from './focus';
import { PAYLOADS, blockJobId, finishJobId, planJobId } from './queue/jobs';
import type { Producer } from './queue/producer';

/** Milliseconds between looks at the outbox when nobody calls. */
const POLL = 1_000;

/** The only place that enqueues: takes rows of the outbox and adds their jobs. */
export class Relay {
  readonly #timer: NodeJS.Timeout;
  readonly #unsubscribe: () => void;
  #busy: Promise<void> | null = null;
  #again = false;
  #closed = false;

  constructor(
    private readonly db: Db,
    private readonly producer: Producer,
    listener: Listener,
    private readonly onError: (error: Error) => void,
  ) {
    this.#timer = setInterval(() => this.#wake(), POLL);
    this.#unsubscribe = listener.subscribe('outbox_added', () => this.#wake());
    this.#wake();
  }

  async close(): Promise<void> {
    this.#closed = true;
    clearInterval(this.#timer);
    this.#unsubscribe();
    await this.#busy;
  }

  #wake(): void {
    if (this.#closed) return;
    if (this.#busy) {
      this.#again = true;
      return;
    }
    this.#busy = this.#drain().finally(() => {
      this.#busy = null;
      if (this.#again) {
        this.#again = false;
        this.#wake();
      }
    });
  }

  async #drain(): Promise<void> {
    try {
      while (!this.#closed && (await takeFromOutbox(this.db, (row) => this.#dispatch(row)))) {
        // The next row.
      }
    } catch (error) {
      // Redis or the database is away: rows stay where they are, and the next look tries again.
      this.onError(error instanceof Error ? error : new Error(String(error)));
    }
  }

  async #dispatch({ kind, payload, dispatchId }: OutboxRow): Promise<void> {
    const raw = { v: 1, ...(typeof payload === 'object' ? payload : {}) };
    switch (kind) {
      case 'plan': {
        const plan = PAYLOADS.plan.parse(raw);
        if ((await findDispatch(this.db, plan)) === null) return;
        await this.producer.add({ name: 'plan', id: planJobId(dispatchId), payload: plan });
        return markDispatched(this.db, plan);
      }
      case 'blocks':
        return this.#dispatchBlocks(PAYLOADS.plan.parse(raw), dispatchId);
      case 'focus':
        return this.#hurry(PAYLOADS.plan.parse(raw));
      case 'pair': {
        const pair = PAYLOADS.pair.parse(raw);
        return this.producer.add({ name: 'pair', id: dispatchId, payload: pair });
      }
      case 'estimate': {
        const estimate = PAYLOADS.estimate.parse(raw);
        return this.producer.add({ name: 'estimate', id: dispatchId, payload: estimate });
      }
      case 'import_estimate': {
        const payload = PAYLOADS.importEstimate.parse(raw);
        return this.producer.add({ name: 'importEstimate', id: dispatchId, payload });
      }
      case 'mail': {
        const mail = PAYLOADS.mail.parse(raw);
        return this.producer.add({ name: 'mail', id: dispatchId, payload: mail });
      }
      case 'beat':
        return this.producer.add({ name: 'beat', id: dispatchId, payload: { v: 1 } });
    }
  }

  async #dispatchBlocks(
    run: { v: 1; runId: string; attempt: number },
    dispatchId: string,
  ): Promise<void> {
    if ((await findDispatch(this.db, run)) === null) return;
    const missing = await listMissing(this.db, run.runId);
    await this.producer.addFlow(
      { name: 'finish', id: finishJobId(dispatchId), payload: run },
      missing.map((block) => ({
        name: 'block',
        id: blockJobId(dispatchId, block),
        payload: { ...run, block },
      })),
    );
    await markDispatched(this.db, run);
    await this.#hurry(run);
  }

  /** Brings the blocks forward that somebody looks at; none is added, so none is computed twice. */
  async #hurry(run: { runId: string; attempt: number }): Promise<void> {
    const looked = await findFocus(this.db, run.runId);
    if (looked === null) return;
    const missing = await listMissingPairs(this.db, run.runId);
    const waiting = missing.map(({ block, pairs, ...stored }) => ({
      block,
      pairs,
      ...decodeBlockPairs(stored),
    }));
    const ids = blocksInFocus(waiting, looked.focus).map((block) =>
      blockJobId(looked.dispatchId, block),
    );
    await this.producer.hurry('blocks', ids);
  }
}
