import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { ROUTES, type RouteName, type RouteRule } from '../../server/contract/access';
import { ROLES, type Role } from '../../server/contract/enums';
import { startApp, type TestApp } from '../support/app';
import type { Answer, Asked, Client } from '../support/client';
import {
  makeDataset,
  makeDoneRun,
  EDGES_CSV,
  importForm,
  makeGroup,
  makeImport,
  makeOriginals,
  makeMember,
  makePerson,
  makeQueuedRun,
  makeWorkspace,
  networkForm,
  NODES_CSV,
  WEIGHTED_PATH,
  type MadeWorkspace,
} from '../support/factories';

type Who = Role | 'outsider' | 'visitor';
type Parameters = Readonly<Record<string, string>>;

interface Sample {
  /** Makes what the address names; anew for each request, since some requests remove it. */
  readonly parameters?: () => Promise<Parameters>;
  readonly send?: Asked | ((parameters: Parameters) => Asked);
  /** The status for somebody who may. */
  readonly status: number;
}

/** Two workspaces; B is where the foreign ids come from. */
interface World {
  readonly workspace: MadeWorkspace;
  readonly datasetId: string;
  readonly revisionId: string;
  readonly runId: string;
}

let app: TestApp;
let a: World;
let b: World;
const clients = new Map<Who, Client>();

async function makeWorld(name: string): Promise<World> {
  const workspace = await makeWorkspace(app.db, name);
  const { id, revisionId } = await makeDataset(app.db, workspace.scope);
  const runId = await makeDoneRun(app.db, workspace.scope, revisionId);
  return { workspace, datasetId: id, revisionId, runId };
}

beforeAll(async () => {
  app = await startApp({ limits: { signUp: { points: 1000, duration: 60 } } });
  a = await makeWorld('A');
  b = await makeWorld('B');
  clients.set('visitor', app.visitor());
  clients.set('outsider', await app.clientOf(b.workspace.owner.id));
  for (const role of ROLES) {
    clients.set(role, await app.clientOf((await makeMember(app.db, a.workspace.scope, role)).id));
  }
});
afterAll(() => app.close());

/** What each row of the table needs, in a world. */
function samples(world: World): Record<RouteName, Sample> {
  const { db } = app;
  const { scope } = world.workspace;
  const run = () => Promise.resolve({ runId: world.runId });
  const draft = async () => ({ importId: await makeImport(db, scope) });
  const fresh = async () => ({ datasetId: (await makeDataset(db, scope)).id });
  const weighted = async () => ({
    revisionId: (await makeDataset(db, scope, 'Weighted path', WEIGHTED_PATH)).revisionId,
  });
  const member = async () => ({ userId: (await makeMember(db, scope, 'reviewer')).id });
  return {
    health: { status: 200 },
    // No worker runs here, and the answer says so.
    ready: { status: 503 },
    instance: { status: 200 },
    signUp: {
      status: 201,
      send: () => ({
        method: 'POST',
        json: {
          name: 'Wren',
          email: `${randomUUID()}@example.org`,
          password: 'seven otters knit lace',
        },
      }),
    },
    // Public, so a wrong password is what refuses here, not the table.
    signIn: {
      status: 401,
      send: () => ({
        method: 'POST',
        json: { email: `${randomUUID()}@example.org`, password: 'seven otters knit lace' },
      }),
    },
    me: { status: 200 },
    signOut: { status: 204, send: { method: 'DELETE' } },
    createWorkspace: { status: 201, send: { method: 'POST', json: { name: 'New' } } },
    workspace: { status: 200 },
    members: { status: 200 },
    addMember: {
      status: 201,
      parameters: async () => ({ email: (await makePerson(db)).email }),
      send: ({ email }) => ({ method: 'POST', json: { email, role: 'reviewer' } }),
    },
    changeMember: {
      status: 200,
      parameters: member,
      send: { method: 'PATCH', json: { role: 'recorder' } },
    },
    removeMember: { status: 204, parameters: member, send: { method: 'DELETE' } },
    datasets: { status: 200 },
    createDataset: { status: 201, send: () => ({ form: networkForm() }) },
    growthModels: { status: 200 },
    growDataset: {
      status: 201,
      send: {
        method: 'POST',
        json: { model: 'constant_probability', nodeCount: 5, seed: 1, name: 'Grown' },
      },
    },
    dataset: {
      status: 200,
      parameters: () => Promise.resolve({ datasetId: world.datasetId }),
    },
    deletedDatasets: { status: 200 },
    archiveDataset: { status: 200, parameters: fresh, send: { method: 'POST' } },
    restoreDataset: { status: 200, parameters: fresh, send: { method: 'POST' } },
    deleteDataset: { status: 204, parameters: fresh, send: { method: 'DELETE' } },
    purgeDataset: {
      status: 204,
      parameters: fresh,
      send: { method: 'POST', json: { name: 'Path of three' } },
    },
    createRevision: {
      status: 201,
      parameters: async () => ({ datasetId: (await makeDataset(db, scope)).id }),
      send: () => ({ form: networkForm({ name: null }) }),
    },
    imports: { status: 200 },
    createImport: {
      status: 201,
      send: () => ({ form: importForm({ 'nodes.csv': NODES_CSV, 'edges.csv': EDGES_CSV }) }),
    },
    importDraft: { status: 200, parameters: draft },
    changeImport: {
      status: 200,
      parameters: draft,
      send: { method: 'PATCH', json: { name: 'Another name' } },
    },
    importProblems: { status: 200, parameters: draft },
    importWeights: { status: 200, parameters: draft },
    saveImport: {
      status: 201,
      parameters: draft,
      send: { method: 'POST', json: { version: 1, name: 'Saved' } },
    },
    deleteImport: { status: 204, parameters: draft, send: { method: 'DELETE' } },
    revision: {
      status: 200,
      parameters: () => Promise.resolve({ revisionId: world.revisionId }),
    },
    revisionDifference: {
      status: 200,
      parameters: () => Promise.resolve({ revisionId: world.revisionId }),
    },
    revisionWeights: {
      status: 200,
      parameters: () => Promise.resolve({ revisionId: world.revisionId }),
    },
    exportRevision: {
      status: 200,
      parameters: () => Promise.resolve({ revisionId: world.revisionId, kind: 'graphml' }),
    },
    originals: {
      status: 200,
      parameters: () => Promise.resolve({ revisionId: world.revisionId }),
    },
    original: {
      status: 200,
      parameters: async () => ({ revisionId: await makeOriginals(db, scope), position: '1' }),
    },
    thresholdRevision: {
      status: 201,
      parameters: weighted,
      send: { method: 'POST', json: { least: 0.5 } },
    },
    correctRevision: {
      status: 201,
      parameters: weighted,
      send: { method: 'POST', json: { corrections: [{ row: 0, entry: '1.5' }] } },
    },
    // The stored answer of the worker is a refusal.
    runEstimate: {
      status: 409,
      parameters: () => Promise.resolve({ revisionId: world.revisionId }),
    },
    createRun: {
      status: 201,
      parameters: () => Promise.resolve({ inBody: world.revisionId }),
      // A part of its own each time: an equal run would be answered with 200.
      send: ({ inBody }) => ({ method: 'POST', json: { revisionId: inBody, part: anotherPart() } }),
    },
    run: { status: 200, parameters: run },
    stopRun: {
      status: 200,
      parameters: async () => ({ runId: await makeQueuedRun(db, scope, world.revisionId) }),
      send: { method: 'POST' },
    },
    // A whole run has nothing left to extend; a done one has nothing left to compute first.
    extendRun: { status: 409, parameters: run, send: { method: 'POST' } },
    focusRun: {
      status: 409,
      parameters: run,
      send: { method: 'PUT', json: { kind: 'node', row: 0 } },
    },
    runEvents: { status: 200, parameters: run },
    runBlock: { status: 200, parameters: async () => ({ ...(await run()), block: '0' }) },
    runBarcode: { status: 200, parameters: run },
    // The stored answer of the worker is a refusal.
    runPair: { status: 409, parameters: async () => ({ ...(await run()), a: '0', b: '1' }) },
    runPairsCsv: { status: 200, parameters: run },
    runBarcodesCsv: { status: 200, parameters: run },
    groups: { status: 200, parameters: run },
    createGroup: {
      status: 201,
      parameters: run,
      send: { method: 'POST', json: { name: 'Pair', nodeIds: ['b', 'a'], origin: 'hand' } },
    },
    deleteGroup: {
      status: 204,
      parameters: async () => ({ groupId: await makeGroup(db, scope, world.runId) }),
      send: { method: 'DELETE' },
    },
  };
}

const names = Object.keys(ROUTES) as RouteName[];
const ruleOf = (name: RouteName): RouteRule => ROUTES[name];

async function ask(
  client: Client,
  name: RouteName,
  workspaceId: string,
  parameters: Parameters,
  sample: Sample,
): Promise<Answer> {
  const path = ruleOf(name).path.replace(/:(\w+)/g, (_, key: string) =>
    key === 'workspaceId' ? workspaceId : (parameters[key] ?? 'missing'),
  );
  const send = typeof sample.send === 'function' ? sample.send(parameters) : sample.send;
  return client.ask(path, { method: ruleOf(name).method.toUpperCase(), ...send });
}

function expected(name: RouteName, who: Who, success: number): number {
  const { access } = ruleOf(name);
  if (access === 'public') return success;
  if (who === 'visitor') return 401;
  if (access === 'account') return success;
  if (who === 'outsider') return 404;
  return access.includes(who) ? success : 403;
}

/** Signing out ends the shared session of a role, so it gets one of its own. */
async function clientFor(who: Who, name: RouteName): Promise<Client> {
  const shared = clients.get(who);
  if (shared === undefined) throw new Error(`Nobody is ${who}.`);
  if (name !== 'signOut' && name !== 'signIn' && name !== 'signUp') return shared;
  return who === 'visitor' ? app.visitor() : app.clientOf((await makePerson(app.db)).id);
}

let positions = 1000;
const anotherPart = () => ({ kind: 'within', positions: (positions += 1) });

describe('who may use which route is what the access table says', () => {
  for (const who of ['visitor', 'outsider', ...ROLES] as const) {
    test.each(names)(`${who}: %s`, async (name) => {
      const sample = samples(a)[name];
      const parameters = (await sample.parameters?.()) ?? {};
      const client = await clientFor(who, name);
      const answer = await ask(client, name, a.workspace.id, parameters, sample);
      const status = expected(name, who, sample.status);
      expect(answer.status, answer.text.slice(0, 300)).toBe(status);
      if (status >= 400) expect(answer.problem.status).toBe(status);
    });
  }
});

const withIds = names.filter((name) => /:(?!workspaceId)\w+/.test(ruleOf(name).path));

describe('an id of another workspace answers exactly as a missing one', () => {
  test.each(withIds)('%s', async (name) => {
    const foreign = samples(b)[name];
    const parameters = (await foreign.parameters?.()) ?? {};
    const missing = Object.fromEntries(
      Object.entries(parameters).map(([key, value]) => [
        key,
        value.length === 36 ? randomUUID() : value,
      ]),
    );
    const owner = clients.get('owner') ?? app.visitor();
    const ofB = await ask(owner, name, a.workspace.id, parameters, foreign);
    const none = await ask(owner, name, a.workspace.id, missing, foreign);
    expect(ofB.status, ofB.text).toBe(404);
    expect({ ...ofB.problem, requestId: '' }).toEqual({ ...none.problem, requestId: '' });
    // In its own workspace the same id is there: the answer above is about the workspace.
    const itsOwner = await app.clientOf(b.workspace.owner.id);
    const there = await ask(itsOwner, name, b.workspace.id, parameters, foreign);
    expect(there.status, there.text).toBe(foreign.status);
  });

  test('a revision of another workspace in the body of a new run', async () => {
    const owner = clients.get('owner') ?? app.visitor();
    const path = `/api/workspaces/${a.workspace.id}/runs`;
    const foreign = await owner.post(path, { revisionId: b.revisionId });
    const missing = await owner.post(path, { revisionId: randomUUID() });
    expect(foreign.status).toBe(404);
    expect(foreign.problem.code).toBe(missing.problem.code);
  });

  test.each(withIds)('%s: what is no id at all is not found either', async (name) => {
    const sample = samples(a)[name];
    const parameters = (await sample.parameters?.()) ?? {};
    const wrong = Object.fromEntries(
      Object.entries(parameters).map(([key, value]) => [key, value.length === 36 ? 'x' : value]),
    );
    const owner = clients.get('owner') ?? app.visitor();
    expect((await ask(owner, name, a.workspace.id, wrong, sample)).status).toBe(404);
  });
});

describe('the role is read for every request', () => {
  test('a demoted analyst cannot bring a network in with the next request', async () => {
    const analyst = await makeMember(app.db, a.workspace.scope, 'analyst');
    const client = await app.clientOf(analyst.id);
    const path = `/api/workspaces/${a.workspace.id}`;
    expect((await client.ask(`${path}/datasets`, { form: networkForm() })).status).toBe(201);
    const owner = clients.get('owner') ?? app.visitor();
    const member = `${path}/members/${analyst.id}`;
    await owner.ask(member, { method: 'PATCH', json: { role: 'reviewer' } });
    expect((await client.ask(`${path}/datasets`, { form: networkForm() })).status).toBe(403);
    await owner.ask(member, { method: 'DELETE' });
    expect((await client.get(path)).status).toBe(404);
  });
});
