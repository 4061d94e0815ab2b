import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { dataset, revision } from '../../server/contract/datasets';
import { growthModelList } from '../../server/contract/models';
import { GROWTH_MODELS, growNetwork } from '../../models/index';
import { makeMember, makeWorkspace } from '../support/factories';
import { Uploading } from '../support/uploading';

let up: Uploading;
beforeAll(async () => {
  up = await Uploading.open();
});
afterAll(() => up.app.close());
afterEach(() => up.nothingLeft());

const CONSTANT = { model: 'constant_probability', nodeCount: 30, seed: 7, name: 'Grown' };
const grow = (more: object = {}) =>
  up.owner.post(`${up.path}/from-model`, { ...CONSTANT, ...more });

describe('the list of models', () => {
  test('names rule, source and the range of every parameter, whose standard value lies in it', async () => {
    const answer = await up.owner.get(`${up.workspacePath}/growth-models`);
    const { models } = answer.read(growthModelList);
    expect(models.map(({ name }) => name)).toEqual(GROWTH_MODELS.map(({ name }) => name));
    for (const { rule, source, parameters } of models) {
      expect(rule).not.toBe('');
      expect(source).toMatch(/\b(19|20)\d{2}\b/);
      for (const { least, most, standard } of parameters) {
        expect(standard).toBeGreaterThanOrEqual(least);
        expect(standard).toBeLessThanOrEqual(most);
      }
    }
  });
});

describe('a grown network', () => {
  test.each(GROWTH_MODELS.map(({ name }) => name))(
    'of %s is an invented dataset with the very edges that the model drew',
    async (model) => {
      const answer = await grow({ model, name: ` ${model} ` });
      expect(answer.status, answer.text).toBe(201);
      const saved = answer.read(dataset);
      const grown = growNetwork({ model, nodeCount: 30, parameters: {}, seed: 7 });
      expect(saved).toMatchObject({ name: model, invented: true, description: grown.description });
      expect(saved.revisions).toHaveLength(1);
      const id = saved.revisions[0]?.id ?? '';
      const read = (await up.owner.get(`${up.workspacePath}/revisions/${id}`)).read(revision);
      const drawn = grown.edgesCsv.trim().split('\n').slice(1).sort();
      const stored = read.edges.map(([a, b]) => `${read.nodes[a]?.id},${read.nodes[b]?.id}`);
      expect(stored.sort()).toEqual(drawn);
      expect(read.nodes.map(({ entry }) => entry)).toEqual(Array.from(read.nodes, (_, i) => i + 1));
    },
  );

  test('of the same seed has the same content, of another seed another', async () => {
    const hashOf = async (more: object) =>
      (await grow(more)).read(dataset).revisions[0]?.contentHash ?? '';
    const first = await hashOf({ name: 'One' });
    expect(first).toMatch(/^[0-9a-f]{64}$/);
    expect(await hashOf({ name: 'Two' })).toBe(first);
    expect(await hashOf({ seed: 8 })).not.toBe(first);
  });
});

describe('what cannot be grown is refused under its field, and nothing is saved', () => {
  test.each([
    ['an unknown model', { model: 'oracle' }, ['model']],
    ['no model', { model: undefined }, ['model']],
    ['no nodes', { nodeCount: 0 }, ['nodeCount']],
    ['too many nodes', { nodeCount: 5001 }, ['nodeCount']],
    ['half a node', { nodeCount: 2.5 }, ['nodeCount']],
    ['a negative seed', { seed: -1 }, ['seed']],
    ['a seed in words', { seed: 'seven' }, ['seed']],
    ['no name', { name: '  ' }, ['name']],
    ['a strange parameter', { parameters: { luck: 1 } }, ['luck']],
    ['a text as a parameter', { parameters: { links: '4' } }, ['parameters.links']],
    ['two wrong numbers', { nodeCount: -1, seed: 0.5 }, ['nodeCount', 'seed']],
    ['an unknown field', { invented: false }, ['invented']],
    [
      'more links than earlier nodes',
      { model: 'preferential_attachment', nodeCount: 4, parameters: { links: 4 } },
      ['links'],
    ],
  ])('%s', async (_kind, more, fields) => {
    await up.nothingSaved(async () => {
      const { status, problem } = await grow(more);
      expect(status).toBe(422);
      expect(problem.issues?.map(({ field }) => field)).toEqual(fields);
    });
  });

  test('a network of more than 2,000,000 edges', async () => {
    const [probability] = GROWTH_MODELS[0]?.parameters ?? [];
    const parameters = { [probability?.name ?? '']: 1 };
    await up.nothingSaved(async () => {
      const { status, problem } = await grow({ nodeCount: 2100, parameters });
      expect(status).toBe(422);
      expect(problem.issues?.map(({ field }) => field)).toEqual(['nodeCount']);
      expect(problem.issues?.[0]?.message).toContain('2,000,000');
    });
  });
});

describe('who may grow a network', () => {
  test.each([
    ['analyst', 201],
    ['recorder', 403],
    ['reviewer', 403],
  ] as const)('%s: %i, and everybody may read the list', async (role, status) => {
    const made = await makeWorkspace(up.app.db, `Workspace of the ${role}`);
    const client = await up.app.clientOf((await makeMember(up.app.db, made.scope, role)).id);
    const path = `/api/workspaces/${made.id}`;
    expect((await client.post(`${path}/datasets/from-model`, CONSTANT)).status).toBe(status);
    expect((await client.get(`${path}/growth-models`)).status).toBe(200);
  });

  test('another workspace is not found', async () => {
    const path = `/api/workspaces/${(await makeWorkspace(up.app.db, 'Elsewhere')).id}`;
    expect((await up.owner.post(`${path}/datasets/from-model`, CONSTANT)).status).toBe(404);
    expect((await up.owner.get(`${path}/growth-models`)).status).toBe(404);
  });
});
