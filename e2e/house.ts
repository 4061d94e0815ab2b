import { randomBytes } from 'node:crypto';
import { expect, type APIRequestContext } from '@playwright/test';
import { me, type Me } from '#contract/accounts';
import { dataset, type Dataset } from '#contract/datasets';
import type { Role } from '#contract/enums';
import { run, startedRun, type Run } from '#contract/runs';
import { workspace, type Workspace } from '#contract/workspaces';
import { csvFile, EDGES_CSV, NODES_CSV } from './network';

export interface Account {
  readonly name: string;
  readonly email: string;
  readonly password: string;
}

/** An account nobody has yet; the password is long enough for one without a second factor. */
export function newAccount(name: string): Account {
  const tail = randomBytes(6).toString('hex');
  return {
    name,
    email: `${name.toLowerCase().replace(/\W+/g, '.')}.${tail}@heddle.example`,
    password: `warp and weft ${tail}`,
  };
}

/**
 * Prepares what a test does not itself show, through the real API with a session of its own.
 */
export class House {
  constructor(private readonly request: APIRequestContext) {}

  async signUp(account: Account): Promise<Me> {
    const answer = await this.request.post('/api/accounts', { data: account });
    expect(answer.status(), await answer.text()).toBe(201);
    return me.parse(await answer.json());
  }

  async signIn({ email, password }: Account): Promise<void> {
    const answer = await this.request.post('/api/session', { data: { email, password } });
    expect(answer.ok(), await answer.text()).toBe(true);
  }

  async workspace(name: string): Promise<Workspace> {
    const answer = await this.request.post('/api/workspaces', { data: { name } });
    expect(answer.status(), await answer.text()).toBe(201);
    return workspace.parse(await answer.json());
  }

  async addMember(workspaceId: string, email: string, role: Role): Promise<void> {
    const path = `/api/workspaces/${workspaceId}/members`;
    const answer = await this.request.post(path, { data: { email, role } });
    expect(answer.status(), await answer.text()).toBe(201);
  }

  async dataset(
    workspaceId: string,
    name: string,
    files = { nodes: NODES_CSV, edges: EDGES_CSV },
  ): Promise<Dataset> {
    const answer = await this.request.post(`/api/workspaces/${workspaceId}/datasets`, {
      multipart: {
        name,
        description: 'Invented for a test.',
        nodes: csvFile('nodes.csv', files.nodes),
        edges: csvFile('edges.csv', files.edges),
      },
    });
    expect(answer.status(), await answer.text()).toBe(201);
    return dataset.parse(await answer.json());
  }

  /** Starts a run of the newest revision and waits until it is finished. */
  async finishedRun(workspaceId: string, { revisions }: Dataset): Promise<Run> {
    const newest = [...revisions].sort((a, b) => b.number - a.number)[0];
    const revisionId = newest?.id;
    const path = `/api/workspaces/${workspaceId}/runs`;
    const answer = await this.request.post(path, { data: { revisionId } });
    expect(answer.status(), await answer.text()).toBe(201);
    const started = startedRun.parse(await answer.json());
    let now: Run = started;
    await expect
      .poll(
        async () => {
          const asked = await this.request.get(`${path}/${started.id}`);
          now = run.parse(await asked.json());
          return now.state;
        },
        { timeout: 60_000 },
      )
      .toBe('done');
    return now;
  }
}
