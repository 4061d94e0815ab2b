import type { Response } from 'express';
import type { RunProgress } from '../../db/repositories/runs';
import type { Scope } from '../../db/repositories/scope';
import { presentProgress } from './presenter';
import type { RunWatches, Snapshot } from './watches';

/** Milliseconds between looks at the session and the role. */
const ALLOWED_EVERY = 4_000;
/** Milliseconds between comments that keep the connection from looking dead. */
const COMMENT_EVERY = 15_000;
const FINAL = new Set<RunProgress['state']>(['done', 'failed', 'stopped']);

/** @returns how many blocks the reader has seen; 0 for anything but a count. */
export function seenBlocks(lastEventId: string | undefined): number {
  return lastEventId !== undefined && /^\d{1,9}$/.test(lastEventId) ? Number(lastEventId) : 0;
}

export interface EventStream {
  readonly runId: string;
  readonly lastEventId: string | undefined;
  readonly response: Response;
  readonly signal: AbortSignal;
  readonly stillAllowed: () => Promise<boolean>;
}

/** Writes progress until the run is over, the reader leaves, or may no longer read. */
export async function streamEvents(
  watches: RunWatches,
  scope: Scope,
  { runId, lastEventId, response, signal, stillAllowed }: EventStream,
): Promise<void> {
  response.status(200);
  response.setHeader('Content-Type', 'text/event-stream; charset=utf-8');
  response.setHeader('Cache-Control', 'no-store');
  response.setHeader('X-Accel-Buffering', 'no');
  response.flushHeaders();
  response.write('retry: 2000\n\n');
  const writer = new Writer(runId, seenBlocks(lastEventId), response);
  await new Promise<void>((resolve) => {
    let leave = (): void => undefined;
    const comment = setInterval(() => response.write(': still here\n\n'), COMMENT_EVERY);
    const end = () => {
      leave();
      clearInterval(comment);
      clearInterval(check);
      resolve();
    };
    const check = setInterval(() => {
      // While the database is away nobody can say no; the next look decides.
      stillAllowed().then(
        (allowed) => !allowed && end(),
        () => undefined,
      );
    }, ALLOWED_EVERY);
    signal.addEventListener('abort', end, { once: true });
    // A watch that knows the run already answers before it has said how to leave it.
    leave = watches.watch(scope, runId, (snapshot) => {
      if (writer.write(snapshot)) queueMicrotask(end);
    });
    if (signal.aborted) end();
  });
  response.end();
}

class Writer {
  #last = '';
  #over = false;

  constructor(
    private readonly runId: string,
    private seen: number,
    private readonly response: Response,
  ) {}

  /** Writes what this reader has not seen. @returns whether the stream is over. */
  write({ progress, landed }: Snapshot): boolean {
    if (this.#over || progress === null) return true;
    // More than there are: not a count of this run.
    if (this.seen > landed.length) this.seen = 0;
    const blocks = landed.slice(this.seen);
    const state = `${progress.state} ${landed.length} ${progress.blockCount} ${progress.pairsDone}`;
    this.#over = FINAL.has(progress.state);
    if (state !== this.#last) {
      const event = presentProgress(this.runId, progress, blocks);
      this.response.write(
        `event: progress\nid: ${landed.length}\ndata: ${JSON.stringify(event)}\n\n`,
      );
      this.seen = landed.length;
      this.#last = state;
    }
    return this.#over;
  }
}
