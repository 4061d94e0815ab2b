import { connect } from 'node:net';
import { once } from 'node:events';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { ROUTES, type RouteName } from '../../server/contract/access';
import { buildRouter } from '../../server/http/router';
import { route, ok, type RouteMap } from '../../server/http/route';
import { startApp, type TestApp } from '../support/app';
import { Cable } from '../support/cable';
import type { Client } from '../support/client';
import { makeWorkspace } from '../support/factories';
import { needed, POSTGRES } from '../support/services';

let app: TestApp;
let owner: Client;
let workspaceId: string;
let pagesFolder: string;
beforeAll(async () => {
  pagesFolder = mkdtempSync(join(tmpdir(), '.heddle-pages-'));
  mkdirSync(join(pagesFolder, 'assets'));
  writeFileSync(join(pagesFolder, 'index.html'), '<!doctype html><title>Heddle</title>');
  writeFileSync(join(pagesFolder, 'assets', 'index-1a2b3c.js'), 'export {};\n'.repeat(500));
  app = await startApp({ environment: { HEDDLE_SPA_DIR: pagesFolder } });
  const made = await makeWorkspace(app.db);
  workspaceId = made.id;
  owner = await app.clientOf(made.owner.id);
});
afterAll(async () => {
  await app.close();
  rmSync(pagesFolder, { recursive: true, force: true });
});

const create = (headers: Record<string, string | null>) =>
  owner.ask('/api/workspaces', { method: 'POST', json: { name: 'New' }, headers });

describe('a change from another site is refused', () => {
  test.each([
    ['a foreign origin', { origin: 'https://example.com' }],
    ['the origin null', { origin: 'null' }],
    ['no origin', { origin: null }],
    ['another port of this host', { origin: 'http://127.0.0.1:1' }],
    ['another scheme of this host', { origin: 'https://127.0.0.1' }],
    ['Sec-Fetch-Site cross-site', { 'sec-fetch-site': 'cross-site' }],
    ['Sec-Fetch-Site same-site', { 'sec-fetch-site': 'same-site' }],
    ['Sec-Fetch-Site none', { 'sec-fetch-site': 'none' }],
  ])('%s', async (_kind, headers) => {
    const { status, problem } = await create(headers);
    expect(status).toBe(403);
    expect(problem.code).toBe('request.foreign_origin');
  });

  test('by multipart and by DELETE too', async () => {
    const headers = { origin: 'https://example.com' };
    const form = new FormData();
    const path = `/api/workspaces/${workspaceId}/datasets`;
    expect((await owner.ask(path, { form, headers })).status).toBe(403);
    expect((await owner.ask('/api/session', { method: 'DELETE', headers })).status).toBe(403);
    expect((await owner.get('/api/session')).status).toBe(200);
  });

  test('but not from the pages of this server, by either sign', async () => {
    expect((await create({ 'sec-fetch-site': 'same-origin', origin: null })).status).toBe(201);
    expect((await create({})).status).toBe(201);
  });

  test('nor when a name of another host points here', async () => {
    const socket = connect(Number(new URL(app.origin).port), '127.0.0.1');
    const body = '{"name":"New"}';
    socket.write(
      `POST /api/workspaces HTTP/1.1\r\nHost: rebound.example\r\nOrigin: http://rebound.example\r\nCookie: ${owner.cookie}\r\nContent-Type: application/json\r\nContent-Length: ${body.length}\r\nConnection: close\r\n\r\n${body}`,
    );
    const chunks: Buffer[] = [];
    socket.on('data', (chunk: Buffer) => chunks.push(chunk));
    await once(socket, 'close');
    expect(Buffer.concat(chunks).toString()).toMatch(/^HTTP\/1\.1 403 /);
  });

  test('and with a public address only that one counts', async () => {
    const environment = { PUBLIC_URL: 'https://heddle.example.org' };
    const open = await startApp({ environment });
    const ask = (origin: string) =>
      open.visitor().ask('/api/session', {
        method: 'POST',
        json: { email: 'a@example.org', password: 'x' },
        headers: { origin },
      });
    expect((await ask('https://heddle.example.org')).status).toBe(401);
    expect((await ask('https://heddle.example.org.evil.example')).status).toBe(403);
    expect((await ask(open.origin)).status).toBe(403);
    await open.close();
  });
});

describe('a body', () => {
  const send = (body: string, contentType: string | null = 'application/json', more = {}) =>
    fetch(`${app.origin}/api/workspaces`, {
      method: 'POST',
      headers: {
        cookie: owner.cookie,
        origin: app.origin,
        ...(contentType === null ? {} : { 'content-type': contentType }),
        ...more,
      },
      body: Buffer.from(body),
    });

  test.each([
    ['text', '{"name":"New"}', 'text/plain', 415],
    ['a form', 'name=New', 'application/x-www-form-urlencoded', 415],
    ['multipart', 'name=New', 'multipart/form-data; boundary=x', 415],
    ['JSON of another kind', '{"name":"New"}', 'application/json-patch', 415],
    ['no type', '{"name":"New"}', null, 415],
    ['another charset', '{"name":"New"}', 'application/json; charset=koi8-r', 415],
    ['half of JSON', '{"name":', 'application/json', 400],
    ['not an object', '"New"', 'application/json', 400],
    ['nothing', '', 'application/json', 422],
    ['null', 'null', 'application/json', 400],
    ['a list', '[1]', 'application/json', 422],
    ['a number for a name', '{"name":1}', 'application/json', 422],
    ['more fields', '{"name":"New","role":"owner"}', 'application/json', 422],
    ['__proto__', '{"name":"New","__proto__":{"role":"owner"}}', 'application/json', 422],
    ['constructor', '{"name":"New","constructor":1}', 'application/json', 422],
    ['a NUL', '{"name":"a\\u0000b"}', 'application/json', 422],
    ['half a surrogate pair', '{"name":"\\udc00"}', 'application/json', 422],
    ['nesting', `{"name":${'['.repeat(100_000)}${']'.repeat(100_000)}}`, 'application/json', 422],
    ['9 MB', `{"name":"${'x'.repeat(9_000_000)}"}`, 'application/json', 413],
  ])('of %s is refused', async (_kind, body, contentType, status) => {
    const answer = await send(body, contentType);
    const text = await answer.text();
    expect(answer.status, text.slice(0, 200)).toBe(status);
    expect(answer.headers.get('content-type')).toMatch(/^application\/problem\+json/);
  });

  test('is refused where none is expected', async () => {
    const answer = await owner.ask('/api/session', { method: 'DELETE', json: { all: true } });
    expect(answer.status).toBe(400);
    expect(answer.problem.code).toBe('request.unexpected_body');
  });
});

describe('an error', () => {
  test('has the shape of a problem, the id of the request, and no stack', async () => {
    const answer = await owner.get('/api/workspaces/x');
    const { problem } = answer;
    expect(problem).toEqual({
      type: 'about:blank',
      title: 'Not found',
      status: 404,
      code: 'workspaces.not_found',
      detail: 'It does not exist here, or is not shared with you.',
      requestId: answer.headers.get('x-request-id'),
    });
    expect(answer.headers.get('cache-control')).toBe('no-store');
    expect(answer.text).not.toMatch(/\bat .*\.ts/);
  });

  test.each([
    ['an unknown address of the API', 'GET', '/api/nothing', 404],
    ['an address that cannot be decoded', 'GET', '/api/workspaces/%E0%A4%A', 400],
    ['an unknown parameter', 'GET', '/api/session?admin=1', 400],
    ['a repeated parameter', 'GET', '/api/session?a=1&a=2', 400],
    ['an address with the wrong letters', 'GET', '/API/session', 404],
    ['another method', 'PUT', '/api/session', 405],
    ['a path that climbs', 'GET', '/assets/..%2f..%2fetc/passwd', 404],
  ])('of %s', async (_kind, method, path, status) => {
    const answer = await owner.ask(path, { method, headers: { accept: 'application/json' } });
    expect(answer.status, answer.text).toBe(status);
    expect(answer.problem.requestId).toMatch(/^[\w-]{36}$/);
    if (status === 405) expect(answer.headers.get('allow')).toBe('POST, GET, DELETE');
  });

  test('of the database being away is 503, and the server goes on when it is back', async () => {
    const cable = new Cable(new URL(needed(POSTGRES, 'HEDDLE_TEST_DATABASE_URL')));
    await cable.plugIn();
    const reach = (url: string) =>
      Object.assign(new URL(url), { host: new URL(cable.address()).host }).href;
    const other = await startApp({ reach });
    const { id, owner: person } = await makeWorkspace(other.db);
    const client = await other.clientOf(person.id);
    const path = `/api/workspaces/${id}`;
    expect((await client.get(path)).status).toBe(200);
    await cable.pullOut();
    for (let n = 0; n < 5; n++) {
      const { status, problem, headers } = await client.get(path);
      expect(status).toBe(503);
      expect(problem.code).toBe('service.database_unavailable');
      expect(headers.get('retry-after')).toBe('2');
    }
    expect((await client.get('/health')).status).toBe(200);
    expect((await client.get('/ready')).status).toBe(503);
    await cable.plugIn();
    await expect.poll(async () => (await client.get(path)).status, { timeout: 5000 }).toBe(200);
    await other.close();
    await cable.pullOut();
  });
});

describe('the pages', () => {
  const html = { accept: 'text/html,application/xhtml+xml' };

  test('are served at every address of theirs, asked for anew each time', async () => {
    for (const path of ['/', '/workspaces/x/runs/y', '/sign-in?next=%2F']) {
      const answer = await app.visitor().get(path, html);
      expect(answer.status).toBe(200);
      expect(answer.text).toContain('<title>Heddle</title>');
      expect(answer.headers.get('cache-control')).toBe('no-cache');
    }
  });

  test('are not served in place of a missing answer or file', async () => {
    expect((await app.visitor().get('/api/nothing', html)).status).toBe(404);
    expect((await app.visitor().get('/assets/gone.js', html)).status).toBe(404);
  });

  test('keep hashed files for good, and compress them', async () => {
    const answer = await app
      .visitor()
      .get('/assets/index-1a2b3c.js', { 'accept-encoding': 'gzip' });
    expect(answer.status).toBe(200);
    expect(answer.headers.get('cache-control')).toBe('public, max-age=31536000, immutable');
    expect(answer.headers.get('content-encoding')).toBe('gzip');
  });

  test('may run no inline script and load nothing from elsewhere', async () => {
    const { headers } = await app.visitor().get('/', html);
    const policy = headers.get('content-security-policy') ?? '';
    const directives = new Map(
      policy.split(';').map((one) => {
        const [name = '', ...values] = one.trim().split(' ');
        return [name, values.join(' ')];
      }),
    );
    expect(directives.get('default-src')).toBe("'none'");
    expect(directives.get('script-src')).toBe("'self'");
    expect(directives.get('connect-src')).toBe("'self'");
    expect(directives.get('frame-ancestors')).toBe("'none'");
    expect(policy).not.toContain('unsafe-eval');
    expect(headers.get('x-content-type-options')).toBe('nosniff');
    expect(headers.get('x-powered-by')).toBeNull();
  });
});

describe('the router', () => {
  const whole = (): RouteMap => {
    const names = Object.keys(ROUTES) as RouteName[];
    return Object.fromEntries(
      names.map((name) => [name, route(name, {}, () => Promise.resolve(ok({})))]),
    ) as unknown as RouteMap;
  };
  const source = { actorOf: () => Promise.resolve(null), roleOf: () => Promise.resolve(null) };
  const build = (routes: object) =>
    buildRouter(routes as RouteMap, source, new AbortController().signal);

  test('refuses a row of the access table without a handler', () => {
    const rest = Object.entries(whole()).filter(([name]) => name !== 'run');
    expect(() => build(Object.fromEntries(rest))).toThrow('No handler for the routes run.');
  });

  test('refuses a handler without a row', () => {
    expect(() => build({ ...whole(), backDoor: whole().run })).toThrow(
      'Not in the access table: backDoor.',
    );
  });

  test('refuses a handler under another name', () => {
    expect(() => build({ ...whole(), run: whole().datasets })).toThrow(
      'The handler of datasets stands under run.',
    );
  });

  test('takes the whole table', () => {
    expect(() => build(whole())).not.toThrow();
  });
});
