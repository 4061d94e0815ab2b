import { once } from 'node:events';
import { readdirSync } from 'node:fs';
import { request as openRequest } from 'node:http';
import { expect } from 'vitest';
import { datasets } from '../../db/schema/index';
import { startApp, type AppOptions, type TestApp } from './app';
import type { Answer, Client } from './client';
import { EDGES_CSV, makeWorkspace, networkForm, NODES_CSV } from './factories';

export interface RawAnswer {
  readonly status: number;
  readonly text: string;
}

/** An owner of a workspace who uploads to the real application. */
export class Uploading {
  private constructor(
    readonly app: TestApp,
    readonly owner: Client,
    readonly workspacePath: string,
  ) {}

  static async open(options?: AppOptions): Promise<Uploading> {
    const app = await startApp(options);
    const made = await makeWorkspace(app.db);
    const owner = await app.clientOf(made.owner.id);
    return new Uploading(app, owner, `/api/workspaces/${made.id}`);
  }

  get path(): string {
    return `${this.workspacePath}/datasets`;
  }

  send(parts: Parameters<typeof networkForm>[0]): Promise<Answer> {
    return this.owner.ask(this.path, { form: networkForm(parts) });
  }

  /** Sends the bytes of a body as they are, in these pieces. @returns null without an answer */
  async raw(
    pieces: readonly Buffer[],
    headers: Readonly<Record<string, string>>,
    end: 'end' | 'abort' = 'end',
    path = this.path,
  ): Promise<RawAnswer | null> {
    const request = openRequest(`${this.app.origin}${path}`, {
      method: 'POST',
      headers: { cookie: this.owner.cookie, origin: this.app.origin, ...headers },
    });
    const answered = new Promise<RawAnswer | null>((resolve) => {
      request.on('error', () => resolve(null));
      request.on('response', (response) => {
        const chunks: Buffer[] = [];
        response.on('data', (chunk: Buffer) => chunks.push(chunk));
        response.on('end', () =>
          resolve({ status: response.statusCode ?? 0, text: Buffer.concat(chunks).toString() }),
        );
        response.on('error', () => resolve(null));
      });
    });
    let over = false;
    void answered.then(() => (over = true));
    for (const piece of pieces) {
      if (over) break;
      if (request.write(piece)) continue;
      const drained = new AbortController();
      await Promise.race([once(request, 'drain', drained).catch(() => null), answered]);
      drained.abort();
    }
    if (end === 'abort') request.destroy();
    else request.end();
    return answered;
  }

  /** Nothing of a refused upload is left: no row, and no file either. */
  async nothingSaved(work: () => Promise<void>): Promise<void> {
    const rows = await this.app.db.$count(datasets);
    await work();
    expect(await this.app.db.$count(datasets)).toBe(rows);
    await this.nothingLeft();
  }

  async nothingLeft(): Promise<void> {
    await expect.poll(() => readdirSync(this.app.uploadFolder), { timeout: 5000 }).toEqual([]);
  }
}

export const BOUNDARY = 'a-boundary';
export const MULTIPART = { 'content-type': `multipart/form-data; boundary=${BOUNDARY}` };
export const part = (disposition: string, content: string): string =>
  `--${BOUNDARY}\r\nContent-Disposition: form-data; ${disposition}\r\n\r\n${content}\r\n`;

/** The bytes of a form that is right. */
export const wholeForm = (filename = 'nodes.csv'): string =>
  [
    part('name="name"', 'Raw'),
    part(`name="nodes"; filename="${filename}"`, NODES_CSV),
    part('name="edges"; filename="edges.csv"', EDGES_CSV),
    `--${BOUNDARY}--\r\n`,
  ].join('');
