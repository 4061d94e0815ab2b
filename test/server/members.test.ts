import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { member, memberList, workspace } from '../../server/contract/workspaces';
import { startApp, type TestApp } from '../support/app';
import type { Client } from '../support/client';
import { makeMember, makePerson, makeWorkspace, type MadeWorkspace } from '../support/factories';

let app: TestApp;
let made: MadeWorkspace;
let owner: Client;
let path: string;
beforeAll(async () => {
  app = await startApp();
});
afterAll(() => app.close());
beforeEach(async () => {
  made = await makeWorkspace(app.db);
  owner = await app.clientOf(made.owner.id);
  path = `/api/workspaces/${made.id}/members`;
});

const demote = (client: Client, userId: string) =>
  client.ask(`${path}/${userId}`, { method: 'PATCH', json: { role: 'reviewer' } });
const remove = (client: Client, userId: string) =>
  client.ask(`${path}/${userId}`, { method: 'DELETE' });
const ownersLeft = async () => {
  const viewer = await app.clientOf((await makeMember(app.db, made.scope, 'reviewer')).id);
  const { members } = (await viewer.get(path)).read(memberList);
  return members.filter(({ role }) => role === 'owner').length;
};

describe('a member', () => {
  test('is added by the address of an account, in whatever letters', async () => {
    const { email, id } = await makePerson(app.db);
    const answer = await owner.post(path, { email: email.toUpperCase(), role: 'recorder' });
    expect(answer.status).toBe(201);
    expect(answer.read(member)).toMatchObject({ userId: id, email, role: 'recorder' });
    const theirs = await (await app.clientOf(id)).get(`/api/workspaces/${made.id}`);
    expect(theirs.read(workspace).role).toBe('recorder');
  });

  test('cannot be added without an account, and the field says so', async () => {
    const { status, problem } = await owner.post(path, {
      email: 'nobody@example.org',
      role: 'analyst',
    });
    expect(status).toBe(404);
    expect(problem).toMatchObject({
      code: 'members.no_such_account',
      issues: [{ field: 'email' }],
    });
  });

  test('is added once however often it is asked at once', async () => {
    const { email } = await makePerson(app.db);
    const answers = await Promise.all(
      Array.from({ length: 5 }, () => owner.post(path, { email, role: 'analyst' })),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409, 409, 409]);
  });

  test('gets no role that does not exist', async () => {
    const { email } = await makePerson(app.db);
    const { status, problem } = await owner.post(path, { email, role: 'administrator' });
    expect(status).toBe(422);
    expect(problem.issues?.[0]?.field).toBe('role');
  });

  test('who reviews cannot make itself an owner', async () => {
    const reviewer = await makeMember(app.db, made.scope, 'reviewer');
    const client = await app.clientOf(reviewer.id);
    const answer = await client.ask(`${path}/${reviewer.id}`, {
      method: 'PATCH',
      json: { role: 'owner' },
    });
    expect(answer.status).toBe(403);
  });
});

describe('the last owner', () => {
  test('can neither leave nor be demoted', async () => {
    for (const act of [demote, remove]) {
      const { status, problem } = await act(owner, made.owner.id);
      expect(status).toBe(409);
      expect(problem.code).toBe('members.last_owner');
    }
    expect(await ownersLeft()).toBe(1);
  });

  test('may stay an owner', async () => {
    const answer = await owner.ask(`${path}/${made.owner.id}`, {
      method: 'PATCH',
      json: { role: 'owner' },
    });
    expect(answer.status).toBe(200);
  });

  test.each(Array.from({ length: 10 }, (_, n) => n))(
    'remains when two owners demote each other at once (%i)',
    async (n) => {
      const second = await makeMember(app.db, made.scope, 'owner');
      const client = await app.clientOf(second.id);
      const act = n % 2 === 0 ? demote : remove;
      const answers = await Promise.all([act(owner, second.id), act(client, made.owner.id)]);
      const statuses = answers.map(({ status }) => status).sort();
      expect(statuses[0]).toBe(n % 2 === 0 ? 200 : 204);
      // The slower one has ceased to own the workspace, or to be in it.
      expect([403, 404]).toContain(statuses[1]);
      expect(await ownersLeft()).toBe(1);
    },
  );

  test.each(Array.from({ length: 10 }, (_, n) => n))(
    'remains when both owners leave at once (%i)',
    async (n) => {
      const second = await makeMember(app.db, made.scope, 'owner');
      const client = await app.clientOf(second.id);
      const act = n % 2 === 0 ? demote : remove;
      const answers = await Promise.all([act(owner, made.owner.id), act(client, second.id)]);
      expect(answers.map(({ status }) => status).sort()).toEqual([n % 2 === 0 ? 200 : 204, 409]);
      expect(await ownersLeft()).toBe(1);
    },
  );
});
