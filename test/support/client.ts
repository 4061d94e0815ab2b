import type { z } from 'zod';
import { problemSchema, type Problem } from '../../server/contract/problems';

export interface Answer {
  readonly status: number;
  readonly headers: Headers;
  readonly text: string;
  readonly bytes: Uint8Array;
  /** The body by its schema. @throws Error if it does not fit */
  read<T>(schema: z.ZodType<T>): T;
  /** The body as a problem. @throws Error if it is none */
  readonly problem: Problem;
}

export interface Asked {
  readonly method?: string;
  /** Sent as JSON. */
  readonly json?: unknown;
  /** Sent as multipart/form-data. */
  readonly form?: FormData;
  /** Null leaves a header out that is otherwise sent. */
  readonly headers?: Readonly<Record<string, string | null>>;
}

/** A browser's part: keeps cookies and names its origin. */
export class Client {
  readonly #cookies = new Map<string, string>();

  constructor(
    readonly origin: string,
    setCookie?: string,
  ) {
    if (setCookie !== undefined) this.#keep(setCookie);
  }

  get cookie(): string {
    return [...this.#cookies].map(([name, value]) => `${name}=${value}`).join('; ');
  }

  get(path: string, headers: Asked['headers'] = {}): Promise<Answer> {
    return this.ask(path, { headers });
  }

  post(path: string, json: unknown): Promise<Answer> {
    return this.ask(path, { method: 'POST', json });
  }

  async ask(path: string, { method, json, form, headers = {} }: Asked): Promise<Answer> {
    const sent = new Headers({ origin: this.origin });
    if (this.cookie !== '') sent.set('cookie', this.cookie);
    if (json !== undefined) sent.set('content-type', 'application/json');
    for (const [name, value] of Object.entries(headers)) {
      if (value === null) sent.delete(name);
      else sent.set(name, value);
    }
    const response = await fetch(`${this.origin}${path}`, {
      method: method ?? (form === undefined ? 'GET' : 'POST'),
      headers: sent,
      body: form ?? (json === undefined ? undefined : JSON.stringify(json)),
      redirect: 'manual',
    });
    for (const line of response.headers.getSetCookie()) this.#keep(line);
    return answerOf(response, new Uint8Array(await response.arrayBuffer()));
  }

  #keep(setCookie: string): void {
    const [pair = ''] = setCookie.split(';');
    const at = pair.indexOf('=');
    const value = pair.slice(at + 1);
    if (value === '') this.#cookies.delete(pair.slice(0, at));
    else this.#cookies.set(pair.slice(0, at), value);
  }
}

function answerOf(response: Response, bytes: Uint8Array): Answer {
  const text = new TextDecoder().decode(bytes);
  const json = (): unknown => JSON.parse(text);
  return {
    status: response.status,
    headers: response.headers,
    text,
    bytes,
    read: (schema) => schema.parse(json()),
    get problem() {
      if (!response.headers.get('content-type')?.startsWith('application/problem+json')) {
        throw new Error(`Status ${response.status} without a problem: ${text.slice(0, 200)}`);
      }
      return problemSchema.parse(json());
    },
  };
}
