import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { group, groupList } from '../../server/contract/groups';
import { startApp, type TestApp } from '../support/app';
import type { Client } from '../support/client';
import { makeDataset, makeDoneRun, makeWorkspace } from '../support/factories';

let app: TestApp;
let owner: Client;
let path: string;
let workspacePath: string;
beforeAll(async () => {
  app = await startApp();
  const made = await makeWorkspace(app.db);
  owner = await app.clientOf(made.owner.id);
  const { revisionId } = await makeDataset(app.db, made.scope);
  workspacePath = `/api/workspaces/${made.id}`;
  path = `${workspacePath}/runs/${await makeDoneRun(app.db, made.scope, revisionId)}/groups`;
});
afterAll(() => app.close());

const wanted = (more: object = {}) => ({
  name: 'Pair',
  nodeIds: ['b', 'a'],
  origin: 'hand',
  ...more,
});

describe('a group', () => {
  test('keeps its nodes in row order, and is listed until it is deleted', async () => {
    const answer = await owner.post(path, wanted({ nodeIds: ['c', 'a'], note: ' why ' }));
    expect(answer.status).toBe(201);
    const saved = answer.read(group);
    expect(saved).toMatchObject({ nodeIds: ['a', 'c'], note: 'why', createdBy: 'Owner of Fen' });
    expect((await owner.get(path)).read(groupList).groups).toEqual([saved]);
    const one = `${workspacePath}/groups/${saved.id}`;
    expect((await owner.ask(one, { method: 'DELETE' })).status).toBe(204);
    expect((await owner.ask(one, { method: 'DELETE' })).status).toBe(404);
    expect((await owner.get(path)).read(groupList).groups).toEqual([]);
  });

  test('names the nodes that the revision does not hold', async () => {
    const nodeIds = ['a', 'x', '__proto__', 'constructor'];
    const { status, problem } = await owner.post(path, wanted({ nodeIds }));
    expect(status).toBe(422);
    expect(problem.issues?.map(({ field }) => field)).toEqual(['nodeIds', 'nodeIds', 'nodeIds']);
    expect(problem.issues?.map(({ message }) => message).join()).toMatch(
      /"x".*"__proto__".*"constructor"/,
    );
  });

  test('says how many more unknown nodes there are than it lists', async () => {
    const nodeIds = Array.from({ length: 5000 }, (_, n) => `x${n}`);
    const { problem } = await owner.post(path, wanted({ nodeIds }));
    expect((problem.issues?.length ?? 0) + (problem.issuesLeftOut ?? 0)).toBe(5000);
  });

  test.each([
    ['a node twice', { nodeIds: ['a', 'a'] }, 'nodeIds'],
    ['one node', { nodeIds: ['a'] }, 'nodeIds'],
    ['too many nodes', { nodeIds: Array.from({ length: 5001 }, String) }, 'nodeIds'],
    ['no name', { name: '  ' }, 'name'],
    ['an unknown origin', { origin: 'oracle' }, 'origin'],
    ['a workspace of its own', { workspaceId: 'x' }, 'workspaceId'],
    ['a NUL in its note', { note: 'a\u0000b' }, 'note'],
    ['half a surrogate pair in its name', { name: 'a\ud800' }, 'name'],
  ])('with %s is refused under that field', async (_kind, more, field) => {
    const { status, problem } = await owner.post(path, wanted(more));
    expect(status).toBe(422);
    expect(problem.issues?.[0]?.field).toBe(field);
  });

  test('may be named by markup, which comes back as text', async () => {
    const name = '<img src=x onerror=alert(1)>';
    const answer = await owner.post(path, wanted({ name }));
    expect(answer.read(group).name).toBe(name);
    expect(answer.headers.get('content-type')).toBe('application/json; charset=utf-8');
    expect(answer.headers.get('x-content-type-options')).toBe('nosniff');
  });
});
