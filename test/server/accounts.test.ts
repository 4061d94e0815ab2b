import { createHash, randomUUID } from 'node:crypto';
import { eq, sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { instance, me } from '../../server/contract/accounts';
import { memberships, sessions, users, workspaces } from '../../db/schema/index';
import { startApp, type TestApp } from '../support/app';
import type { Client } from '../support/client';
import { makePerson } from '../support/factories';

const PASSWORD = 'seven otters knit lace';
const HOUR = 60 * 60 * 1000;
const DAY = 24 * HOUR;
const freely = { points: 100_000, duration: 60 };
const account = (more: object = {}) => ({
  name: 'Wren Tarn',
  email: `${randomUUID()}@example.org`,
  password: PASSWORD,
  ...more,
});

let app: TestApp;
beforeAll(async () => {
  app = await startApp({ limits: { account: freely, address: freely, signUp: freely } });
});
afterAll(() => app.close());

const secretOf = (client: Client) => client.cookie.split('=')[1] ?? '';
const storedId = (client: Client) => createHash('sha256').update(secretOf(client)).digest('hex');

describe('the first account', () => {
  test('of twenty made at once exactly one owns the first workspace', async () => {
    const visitor = app.visitor();
    expect((await visitor.get('/api/instance')).read(instance)).toEqual({
      hasAccounts: false,
      demoAccounts: null,
    });
    const answers = await Promise.all(
      Array.from({ length: 20 }, () =>
        app.visitor().post('/api/accounts', account({ workspaceName: 'Saltings' })),
      ),
    );
    expect(answers.map(({ status }) => status)).toEqual(Array(20).fill(201));
    const owned = answers.flatMap((answer) => answer.read(me).memberships);
    expect(owned).toMatchObject([{ workspaceName: 'Saltings', role: 'owner' }]);
    expect(await app.db.$count(workspaces)).toBe(1);
    expect(await app.db.$count(memberships)).toBe(1);
    expect((await visitor.get('/api/instance')).read(instance).hasAccounts).toBe(true);
  });
});

describe('an account', () => {
  test('is signed in at once, and its password is stored as argon2id only', async () => {
    const client = app.visitor();
    const wanted = account();
    expect((await client.post('/api/accounts', wanted)).status).toBe(201);
    const known = (await client.get('/api/session')).read(me);
    expect(known).toMatchObject({ name: 'Wren Tarn', email: wanted.email, memberships: [] });
    const [row] = await app.db.select().from(users).where(eq(users.id, known.id));
    expect(row?.passwordHash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
  });

  test('of a taken address is refused under that field, in whatever letters', async () => {
    const wanted = account();
    await app.visitor().post('/api/accounts', wanted);
    const again = { ...wanted, email: wanted.email.toUpperCase() };
    const { status, problem } = await app.visitor().post('/api/accounts', again);
    expect(status).toBe(409);
    expect(problem).toMatchObject({ code: 'accounts.email_taken', issues: [{ field: 'email' }] });
  });

  test('made twice at once exists once', async () => {
    const wanted = account();
    const answers = await Promise.all(
      Array.from({ length: 6 }, () => app.visitor().post('/api/accounts', wanted)),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409, 409, 409, 409]);
  });

  test.each([
    ['short', 'fourteen chars'],
    ['long', 'x y '.repeat(40)],
    ['one character', 'aaaaaaaaaaaaaaaaaaaa'],
    ['a repeated word', 'reedreedreedreedreed'],
    ['a walk along the keyboard', 'qwertyuiopasdfghjkl'],
    ['the alphabet backwards', 'zyxwvutsrqponmlkj'],
    ['digits in order', '123456789012345678'],
    ['a known phrase', 'Correct Horse Battery Staple!'],
    ['the name', 'Wren Tarnwater 1'],
    ['the address', 'wren.tarn.water@example.org'],
  ])('with a password that is %s is refused under that field', async (_kind, password) => {
    const person = { name: 'Wren Tarnwater', email: 'wren.tarn.water@example.org', password };
    const { status, problem } = await app.visitor().post('/api/accounts', person);
    expect(status).toBe(422);
    expect(problem.issues?.map(({ field }) => field)).toEqual(['password']);
  });

  test.each([{ role: 'owner' }, { workspaceId: randomUUID() }, { id: randomUUID() }])(
    'cannot set %o by itself',
    async (more) => {
      const { status, problem } = await app.visitor().post('/api/accounts', account(more));
      expect(status).toBe(422);
      expect(problem.issues?.[0]?.field).toBe(Object.keys(more)[0]);
    },
  );

  test('keeps a name with line ends, quotes and marks as it was written', async () => {
    const name = 'Zoë "<img src=x onerror=alert(1)>" O’Fen\r\nBcc: x';
    const client = app.visitor();
    await client.post('/api/accounts', account({ name }));
    expect((await client.get('/api/session')).read(me).name).toBe(name);
  });
});

describe('a session', () => {
  test('is stored as the SHA-256 of a secret of at least 128 bits', async () => {
    const client = app.visitor();
    await client.post('/api/accounts', account());
    const secret = secretOf(client);
    expect(Buffer.from(secret, 'base64url').length).toBeGreaterThanOrEqual(16);
    const ids = (await app.db.select({ id: sessions.id }).from(sessions)).map(({ id }) => id);
    expect(ids).toContain(storedId(client));
    expect(ids).not.toContain(secret);
  });

  test('travels in a cookie that scripts and other sites cannot use', async () => {
    const answer = await app.visitor().post('/api/accounts', account());
    const cookie = answer.headers.get('set-cookie') ?? '';
    expect(cookie).toMatch(/^heddle=/);
    expect(cookie).toContain('HttpOnly');
    expect(cookie).toContain('SameSite=Lax');
    expect(cookie).not.toContain('Secure');
  });

  test('gets a new secret at sign-in, and the old one opens nothing', async () => {
    const client = app.visitor();
    const wanted = account();
    await client.post('/api/accounts', wanted);
    const before = client.cookie;
    const { email } = wanted;
    expect((await client.post('/api/session', { email, password: PASSWORD })).status).toBe(200);
    expect(client.cookie).not.toBe(before);
    expect((await client.get('/api/session')).status).toBe(200);
    expect((await client.get('/api/session', { cookie: before })).status).toBe(401);
  });

  test('ends at sign-out: the cookie opens nothing afterwards', async () => {
    const client = app.visitor();
    await client.post('/api/accounts', account());
    const { cookie } = client;
    expect((await client.ask('/api/session', { method: 'DELETE' })).status).toBe(204);
    expect(client.cookie).toBe('');
    expect((await client.get('/api/session', { cookie })).status).toBe(401);
  });

  test.each(['', 'x', 'a'.repeat(5000), '%00', '"; drop table sessions'])(
    'is not opened by the cookie %j',
    async (value) => {
      const answer = await app.visitor().get('/api/session', { cookie: `heddle=${value}` });
      expect(answer.status).toBe(401);
    },
  );

  test('ends when its person is deleted', async () => {
    const person = await makePerson(app.db);
    const client = await app.clientOf(person.id);
    expect((await client.get('/api/session')).status).toBe(200);
    await app.db.delete(users).where(eq(users.id, person.id));
    expect((await client.get('/api/session')).status).toBe(401);
  });

  test('that was idle for 7 days is over and removed', async () => {
    const client = await app.clientOf((await makePerson(app.db)).id);
    const of = eq(sessions.id, storedId(client));
    await app.db
      .update(sessions)
      .set({ expiresAt: new Date(Date.now() - 1000) })
      .where(of);
    expect((await client.get('/api/session')).status).toBe(401);
    expect(await app.db.$count(sessions, of)).toBe(0);
  });

  test('that is used moves its idle limit to 7 days from now', async () => {
    const client = await app.clientOf((await makePerson(app.db)).id);
    const of = eq(sessions.id, storedId(client));
    await app.db
      .update(sessions)
      .set({ expiresAt: new Date(Date.now() + 6 * DAY) })
      .where(of);
    expect((await client.get('/api/session')).status).toBe(200);
    const [row] = await app.db.select().from(sessions).where(of);
    const left = (row?.expiresAt.getTime() ?? 0) - Date.now();
    expect(left).toBeGreaterThan(7 * DAY - HOUR);
    expect(left).toBeLessThanOrEqual(7 * DAY);
  });

  test('is over 30 days after sign-in however much it is used', async () => {
    const client = await app.clientOf((await makePerson(app.db)).id);
    const of = eq(sessions.id, storedId(client));
    const made = (age: number) =>
      app.db
        .update(sessions)
        .set({ createdAt: new Date(Date.now() - age) })
        .where(of);
    await made(30 * DAY - HOUR);
    expect((await client.get('/api/session')).status).toBe(200);
    const [row] = await app.db.select().from(sessions).where(of);
    expect(row?.expiresAt.getTime()).toBeLessThanOrEqual(Date.now() + HOUR);
    await made(30 * DAY + 1000);
    expect((await client.get('/api/session')).status).toBe(401);
    expect(await app.db.$count(sessions, of)).toBe(0);
  });
});

describe('an unknown address', () => {
  const signIn = (email: string) =>
    app.visitor().post('/api/session', { email, password: 'not the right one at all' });

  test('answers like a wrong password', async () => {
    const known = account();
    await app.visitor().post('/api/accounts', known);
    const [wrong, unknown] = [await signIn(known.email), await signIn('nobody@example.org')];
    expect(wrong.status).toBe(401);
    expect({ ...unknown.problem, requestId: '' }).toEqual({ ...wrong.problem, requestId: '' });
    expect([...unknown.headers.keys()].sort()).toEqual([...wrong.headers.keys()].sort());
  });

  test('takes as long as a wrong password within 5 %', async () => {
    const known = account();
    await app.visitor().post('/api/accounts', known);
    const times: Record<'known' | 'unknown', number[]> = { known: [], unknown: [] };
    const time = async (kind: 'known' | 'unknown', email: string) => {
      const start = performance.now();
      await signIn(email);
      times[kind].push(performance.now() - start);
    };
    const ratio = () => median(times.unknown) / median(times.known);
    // Interleaved, so that whatever else the machine does meets both; more samples while noisy.
    for (let n = 0; n < 300 && (n < 20 || Math.abs(ratio() - 1) > 0.05); n++) {
      const order = n % 2 === 0 ? (['known', 'unknown'] as const) : (['unknown', 'known'] as const);
      for (const kind of order) {
        await time(kind, kind === 'known' ? known.email : `${randomUUID()}@example.org`);
      }
    }
    expect(Math.abs(ratio() - 1)).toBeLessThanOrEqual(0.05);
  });

  const median = (values: readonly number[]) =>
    [...values].sort((x, y) => x - y)[Math.floor(values.length / 2)] ?? 0;
});

describe('in a demo instance', () => {
  test('a visitor is told the invented accounts', async () => {
    const demo = await startApp({ environment: { HEDDLE_DEMO: '1' } });
    const { demoAccounts } = (await demo.visitor().get('/api/instance')).read(instance);
    expect(demoAccounts?.length).toBe(12);
    await demo.close();
  });
});

describe('over https', () => {
  test('the cookie is Secure, bound to the host, and the plain one is not read', async () => {
    const origin = 'https://heddle.example.org';
    const secure = await startApp({ environment: { PUBLIC_URL: origin } });
    const answer = await secure
      .visitor()
      .ask('/api/accounts', { method: 'POST', json: account(), headers: { origin } });
    expect(answer.status).toBe(201);
    const cookie = answer.headers.get('set-cookie') ?? '';
    expect(cookie).toMatch(/^__Host-heddle=/);
    expect(cookie).toContain('; Secure');
    expect(cookie).toContain('Path=/');
    expect(cookie).not.toContain('Domain');
    const [pair = ''] = cookie.split(';');
    const visitor = secure.visitor();
    expect((await visitor.get('/api/session', { cookie: pair })).status).toBe(200);
    const plain = pair.replace('__Host-', '');
    expect((await visitor.get('/api/session', { cookie: plain })).status).toBe(401);
    await secure.close();
  });
});

test('ended sessions are swept from the table', async () => {
  const { makeSessions } = await import('../../server/auth/sessions');
  const person = await makePerson(app.db);
  const [ended, open] = [await app.clientOf(person.id), await app.clientOf(person.id)];
  await app.db
    .update(sessions)
    .set({ createdAt: sql`now() - interval '31 days'` })
    .where(eq(sessions.id, storedId(ended)));
  expect(await makeSessions(app.db, false).sweep()).toBe(1);
  expect(await app.db.$count(sessions, eq(sessions.id, storedId(open)))).toBe(1);
});
