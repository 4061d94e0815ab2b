import pg from 'pg';

/**
 * `run_changed` carries a run id, `pair_answered` run id, p and q, `estimate_answered` revision id
 * and highest dimension, `outbox_added` nothing.
 */
export const CHANNELS = [
  'run_changed',
  'pair_answered',
  'estimate_answered',
  'outbox_added',
] as const;
export type Channel = (typeof CHANNELS)[number];

/** Receives the payload, or null after a lost connection: anything may have happened meanwhile. */
export type Heard = (payload: string | null) => void;

export interface Listener {
  /** @returns a function that ends the subscription. */
  subscribe(channel: Channel, heard: Heard): () => void;
  /** Resolves once the connection listens. */
  ready(): Promise<void>;
  close(): Promise<void>;
}

const FIRST_WAIT = 200;
const LONGEST_WAIT = 5_000;

/** One connection of this process that listens to every channel and comes back after a loss. */
export function openListener(url: string, onError: (error: Error) => void): Listener {
  const heard = new Map<Channel, Set<Heard>>(CHANNELS.map((channel) => [channel, new Set()]));
  let client: pg.Client | null = null;
  let wait = FIRST_WAIT;
  let timer: NodeJS.Timeout | null = null;
  let closed = false;
  let listening = false;
  const waiting = new Set<() => void>();

  const tell = (channel: string, payload: string | null) => {
    const known = CHANNELS.find((name) => name === channel);
    if (known) for (const hear of [...(heard.get(known) ?? [])]) hear(payload);
  };

  const again = (lost: pg.Client) => {
    if (client !== lost || closed) return;
    client = null;
    listening = false;
    void lost.end().catch(() => undefined);
    timer = setTimeout(connect, wait);
    wait = Math.min(LONGEST_WAIT, wait * 2);
  };

  const connect = () => {
    timer = null;
    const next = new pg.Client({
      connectionString: url,
      application_name: 'heddle-listener',
      connectionTimeoutMillis: 5_000,
      keepAlive: true,
    });
    client = next;
    next.on('error', (error) => {
      onError(error);
      again(next);
    });
    next.on('end', () => again(next));
    next.on('notification', ({ channel, payload }) => tell(channel, payload ?? ''));
    listen(next).catch((error: unknown) => {
      onError(error instanceof Error ? error : new Error(String(error)));
      again(next);
    });
  };

  const listen = async (next: pg.Client) => {
    await next.connect();
    for (const channel of CHANNELS) await next.query(`listen ${channel}`);
    wait = FIRST_WAIT;
    listening = true;
    for (const resolve of waiting) resolve();
    waiting.clear();
    for (const channel of CHANNELS) tell(channel, null);
  };

  connect();
  return {
    subscribe(channel, hear) {
      const set = heard.get(channel);
      set?.add(hear);
      return () => void set?.delete(hear);
    },
    ready: () =>
      listening ? Promise.resolve() : new Promise((resolve) => void waiting.add(resolve)),
    async close() {
      closed = true;
      if (timer) clearTimeout(timer);
      const last = client;
      client = null;
      await last?.end().catch(() => undefined);
    },
  };
}
