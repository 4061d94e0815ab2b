import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { startApp, type TestApp } from '../support/app';
import { needed, REDIS } from '../support/services';

const PASSWORD = 'seven otters knit lace';
const limits = {
  account: { points: 4, duration: 600 },
  address: { points: 12, duration: 600 },
  signUp: { points: 3, duration: 600 },
};
const person = () => ({ name: 'Wren', email: `${randomUUID()}@example.org`, password: PASSWORD });

const kinds = [
  ['in Redis', () => needed(REDIS, 'HEDDLE_TEST_REDIS_URL')],
  ['in memory', () => undefined],
  // Nothing listens there: every count falls back to memory.
  ['in memory while Redis is away', () => 'redis://127.0.0.1:1/0'],
] as const;

describe.each(kinds)('attempts to sign in, counted %s', (_kind, redisUrl) => {
  let app: TestApp;
  beforeAll(async () => {
    app = await startApp({ limits, redisUrl: redisUrl() });
  });
  afterAll(() => app.close());

  const signIn = (email: string, password: string) =>
    app.visitor().post('/api/session', { email, password });

  test('stop after the limit of an account, even with the right password', async () => {
    const { email, ...rest } = person();
    await app.visitor().post('/api/accounts', { email, ...rest });
    for (let n = 0; n < 4; n++) expect((await signIn(email, 'wrong')).status).toBe(401);
    const { status, problem, headers } = await signIn(email.toUpperCase(), PASSWORD);
    expect(status).toBe(429);
    expect(problem.code).toBe('session.too_many_attempts');
    expect(Number(headers.get('retry-after'))).toBeGreaterThan(500);
  });

  test('count alike for an address without an account', async () => {
    const { email } = person();
    for (let n = 0; n < 4; n++) expect((await signIn(email, 'wrong')).status).toBe(401);
    expect((await signIn(email, 'wrong')).status).toBe(429);
  });

  test('of one peer stop for every account, whatever X-Forwarded-For says', async () => {
    const spoofed = () =>
      app.visitor().ask('/api/session', {
        method: 'POST',
        json: { email: person().email, password: 'wrong' },
        headers: { 'x-forwarded-for': `10.0.0.${Math.floor(Math.random() * 250)}` },
      });
    const statuses: number[] = [];
    for (let n = 0; n < 12; n++) statuses.push((await spoofed()).status);
    expect(statuses.at(-1)).toBe(429);
  });

  test('new accounts of one peer stop after the limit', async () => {
    const statuses: number[] = [];
    for (let n = 0; n < 3; n++) {
      statuses.push((await app.visitor().post('/api/accounts', person())).status);
    }
    expect(statuses).toEqual([201, 201, 429]);
  });
});

test('a right password forgets the wrong ones before it', async () => {
  const app = await startApp({ limits, redisUrl: needed(REDIS, 'HEDDLE_TEST_REDIS_URL') });
  const { email, ...rest } = person();
  await app.visitor().post('/api/accounts', { email, ...rest });
  const signIn = (password: string) => app.visitor().post('/api/session', { email, password });
  for (let round = 0; round < 2; round++) {
    for (let n = 0; n < 3; n++) expect((await signIn('wrong')).status).toBe(401);
    expect((await signIn(PASSWORD)).status).toBe(200);
  }
  await app.close();
});
