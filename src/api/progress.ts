import { progressEvent, type ProgressEvent } from '#contract/progress';
import { inWorkspace } from './client';

export interface ProgressListener {
  readonly onProgress: (event: ProgressEvent) => void;
  /** True while the stream is down and being tried again. */
  readonly onDown?: (down: boolean) => void;
}

const FINAL = new Set(['done', 'failed', 'stopped']);
const RETRY_FIRST_MS = 500;
const RETRY_MOST_MS = 10_000;

/**
 * Follows one run until its final state. The browser itself reconnects a dropped stream and sends
 * Last-Event-ID; where it gives up (an error status, a refused connection) a new stream is opened
 * after a growing pause, and the server tells it everything from the start.
 * @returns ends the subscription.
 */
export function followRun(
  workspaceId: string,
  runId: string,
  listener: ProgressListener,
): () => void {
  const path = inWorkspace(workspaceId, 'runs', runId, 'events');
  let source: EventSource | null = null;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let pause = RETRY_FIRST_MS;
  let ended = false;

  const end = (): void => {
    ended = true;
    clearTimeout(timer);
    source?.close();
  };

  const receive = (message: MessageEvent<string>): void => {
    const event = progressEvent.parse(JSON.parse(message.data));
    pause = RETRY_FIRST_MS;
    listener.onDown?.(false);
    if (FINAL.has(event.state)) end();
    listener.onProgress(event);
  };

  const open = (): void => {
    source = new EventSource(path);
    source.addEventListener('progress', receive);
    source.addEventListener('error', () => {
      if (ended) return;
      listener.onDown?.(true);
      if (source?.readyState !== EventSource.CLOSED) return;
      timer = setTimeout(open, pause);
      pause = Math.min(2 * pause, RETRY_MOST_MS);
    });
  };

  open();
  return end;
}
