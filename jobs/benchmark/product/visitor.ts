import { randomUUID } from 'node:crypto';
import type { z } from 'zod';
import { me, type SignUpRequest } from '#contract/accounts';
import { dataset } from '#contract/datasets';
import { progressEvent, type ProgressEvent } from '#contract/progress';
import { startedRun } from '#contract/runs';
import type { Network } from '../../engine/types';

export const ACCOUNT = {
  name: 'Bench',
  email: 'bench@heddle.example',
  password: 'a bench that measures itself',
  workspaceName: 'Bench',
} as const satisfies SignUpRequest;

/** Somebody who brings networks in and starts runs over HTTP, as the pages do. */
export class Visitor {
  private cookie = '';
  private workspacePath = '';
  workspaceId = '';

  constructor(private readonly origin: string) {}

  /** The first account of an empty instance, which owns its first workspace. */
  async signUp(): Promise<void> {
    const person = await this.post('/api/accounts', me, ACCOUNT);
    this.workspaceId = person.memberships[0]?.workspaceId ?? '';
    this.workspacePath = `/api/workspaces/${this.workspaceId}`;
  }

  /**
   * Uploads a network under a name; its first node is labelled with the name, so that no two
   * revisions are equal and no run is found instead of computed.
   */
  async upload(name: string, network: Network): Promise<{ datasetId: string; revisionId: string }> {
    const form = new FormData();
    form.append('name', name);
    form.append('description', 'Invented data: a random graph.');
    form.append('nodes', csvFile(nodesCsv(network, name)), 'nodes.csv');
    form.append('edges', csvFile(edgesCsv(network)), 'edges.csv');
    const answer = await this.ask(`${this.workspacePath}/datasets`, { method: 'POST', body: form });
    const made = dataset.parse(await answer.json());
    const revisionId = made.revisions[0]?.id;
    if (revisionId === undefined) throw new Error('The dataset has no revision.');
    return { datasetId: made.id, revisionId };
  }

  /** Submits a run of every pair, D = 3. @returns its path and id */
  async submit(revisionId: string): Promise<{ path: string; id: string }> {
    const path = `${this.workspacePath}/runs`;
    const started = await this.post(path, startedRun, { revisionId });
    if (started.found) throw new Error('The run was found and not computed.');
    return { path: `${path}/${started.id}`, id: started.id };
  }

  async get(path: string): Promise<unknown> {
    return (await this.ask(path, {})).json();
  }

  async revision(revisionId: string): Promise<unknown> {
    return this.get(`${this.workspacePath}/revisions/${revisionId}`);
  }

  async bytes(path: string): Promise<ArrayBuffer> {
    return (await this.ask(path, {})).arrayBuffer();
  }

  /** The progress events of a run until its stream ends. */
  async *events(runPath: string): AsyncGenerator<ProgressEvent> {
    const answer = await this.ask(`${runPath}/events`, {
      headers: { accept: 'text/event-stream' },
    });
    const reader = answer.body?.getReader();
    const decoder = new TextDecoder();
    let text = '';
    for (;;) {
      const piece = await reader?.read();
      if (piece === undefined || piece.done) return;
      const messages = (text + decoder.decode(piece.value, { stream: true })).split('\n\n');
      text = messages.pop() ?? '';
      for (const message of messages) {
        const data = /^data: ?(.*)$/m.exec(message)?.[1];
        if (data !== undefined) yield progressEvent.parse(JSON.parse(data));
      }
    }
  }

  private async post<T>(path: string, schema: z.ZodType<T>, body: object): Promise<T> {
    const answer = await this.ask(path, {
      method: 'POST',
      headers: { 'content-type': 'application/json', 'idempotency-key': randomUUID() },
      body: JSON.stringify(body),
    });
    return schema.parse(await answer.json());
  }

  private async ask(path: string, request: RequestInit): Promise<Response> {
    const headers = new Headers(request.headers);
    headers.set('origin', this.origin);
    if (this.cookie !== '') headers.set('cookie', this.cookie);
    const answer = await fetch(`${this.origin}${path}`, { ...request, headers });
    if (!answer.ok) throw new Error(`${path}: ${answer.status} ${await answer.text()}`);
    for (const line of answer.headers.getSetCookie()) this.cookie = line.split(';')[0] ?? '';
    return answer;
  }
}

const csvFile = (text: string): Blob => new Blob([text], { type: 'text/csv' });

function nodesCsv({ values }: Network, label: string): string {
  const rows = Array.from(values, (value, v) => `n${v},${v === 0 ? label : `Node ${v}`},${value}`);
  return ['id,label,entry', ...rows].join('\n');
}

function edgesCsv({ edges }: Network): string {
  const rows = Array.from(
    { length: edges.length / 2 },
    (_, e) => `n${edges[2 * e]},n${edges[2 * e + 1]}`,
  );
  return ['source,target', ...rows].join('\n');
}
