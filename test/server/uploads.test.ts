import { randomBytes } from 'node:crypto';
import { once } from 'node:events';
import { readdirSync } from 'node:fs';
import { request as openRequest } from 'node:http';
import { gzipSync } from 'node:zlib';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { dataset, revision, UPLOAD_LIMITS } from '../../server/contract/datasets';
import { datasets } from '../../db/schema/index';
import { startApp, type TestApp } from '../support/app';
import type { Client } from '../support/client';
import { EDGES_CSV, makeWorkspace, networkForm, NODES_CSV } from '../support/factories';

let app: TestApp;
let owner: Client;
let workspacePath: string;
let path: string;
beforeAll(async () => {
  app = await startApp();
  const made = await makeWorkspace(app.db);
  owner = await app.clientOf(made.owner.id);
  workspacePath = `/api/workspaces/${made.id}`;
  path = `${workspacePath}/datasets`;
});
afterAll(() => app.close());

const left = () => readdirSync(app.uploadFolder);

const send = (parts: Parameters<typeof networkForm>[0]) =>
  owner.ask(path, { form: networkForm(parts) });

/** Sends the bytes of a body as they are, in these pieces. */
async function raw(
  pieces: readonly Buffer[],
  headers: Readonly<Record<string, string>>,
  end: 'end' | 'abort' = 'end',
): Promise<{ status: number; text: string } | null> {
  const request = openRequest(`${app.origin}${path}`, {
    method: 'POST',
    headers: { cookie: owner.cookie, origin: app.origin, ...headers },
  });
  const answered = new Promise<{ status: number; text: string } | null>((resolve) => {
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
    if (!request.write(piece)) {
      const drained = new AbortController();
      await Promise.race([once(request, 'drain', drained).catch(() => null), answered]);
      drained.abort();
    }
  }
  if (end === 'abort') request.destroy();
  else request.end();
  return answered;
}

const BOUNDARY = 'a-boundary';
const multipart = { 'content-type': `multipart/form-data; boundary=${BOUNDARY}` };
const part = (disposition: string, content: string) =>
  `--${BOUNDARY}\r\nContent-Disposition: form-data; ${disposition}\r\n\r\n${content}\r\n`;
const whole = (filename = 'nodes.csv') =>
  [
    part('name="name"', 'Raw'),
    part(`name="nodes"; filename="${filename}"`, NODES_CSV),
    part('name="edges"; filename="edges.csv"', EDGES_CSV),
    `--${BOUNDARY}--\r\n`,
  ].join('');

/** Nothing of a refused upload is left: no row and no file. */
async function nothingSaved(work: () => Promise<void>): Promise<void> {
  const rows = await app.db.$count(datasets);
  await work();
  expect(await app.db.$count(datasets)).toBe(rows);
}
afterEach(async () => {
  await expect.poll(left, { timeout: 5000 }).toEqual([]);
});

describe('a network that is right', () => {
  test('becomes a dataset with revision 1, and what was folded is said', async () => {
    const nodes =
      'id,label,entry,earliest,latest,habitat\na,Ä,1.5,1,2,reed\nb,b,1.5,,,\nc,,-3,,,\n';
    const edges = 'source,target\na,b\nb,a\na,b\nc,c\n';
    const answer = await send({ name: ' Fen ', nodes, edges });
    expect(answer.status, answer.text).toBe(201);
    const saved = answer.read(dataset);
    expect(saved).toMatchObject({ name: 'Fen', invented: false, runs: [] });
    expect(saved.revisions).toHaveLength(1);
    expect(saved.revisions[0]).toMatchObject({
      number: 1,
      nodeCount: 3,
      edgeCount: 1,
      entryUnit: 'number',
      createdBy: 'Owner of Fen',
      report: {
        nodeRows: 3,
        edgeRows: 4,
        selfLoops: 1,
        duplicateEdges: 1,
        reversedEdges: 1,
        tiedNodes: 2,
        isolatedNodes: 1,
        components: 2,
        ignoredColumns: ['nodes.csv: habitat'],
      },
    });
    const id = saved.revisions[0]?.id ?? '';
    const read = (await owner.get(`${workspacePath}/revisions/${id}`)).read(revision);
    expect(read.edges).toEqual([[0, 1]]);
    expect(read.nodes).toEqual([
      { id: 'a', label: 'Ä', entryRaw: '1.5', entry: 1.5, earliest: 1, latest: 2 },
      { id: 'b', label: 'b', entryRaw: '1.5', entry: 1.5, earliest: null, latest: null },
      { id: 'c', label: 'c', entryRaw: '-3', entry: -3, earliest: null, latest: null },
    ]);
  });

  test('keeps hostile labels and ids as text', async () => {
    const labels = [
      '<img src=x onerror=alert(1)>',
      '=HYPERLINK("x")',
      'a\u202eb',
      '{1,"2\\",NULL}',
    ];
    const quote = (text: string) => `"${text.replaceAll('"', '""')}"`;
    const nodes = `id,label,entry\n__proto__,${labels.map(quote).join(',1\n')}`.split('\n');
    const rows = labels.map(
      (label, n) => `${['__proto__', 'constructor', 'null', 'c4'][n]},${quote(label)},${n}`,
    );
    const answer = await send({
      nodes: [nodes[0], ...rows].join('\n'),
      edges: 'source,target\n__proto__,constructor\n',
    });
    expect(answer.status, answer.text).toBe(201);
    const id = answer.read(dataset).revisions[0]?.id ?? '';
    const read = (await owner.get(`${workspacePath}/revisions/${id}`)).read(revision);
    expect(read.nodes.map(({ label }) => label)).toEqual(labels);
    expect(read.nodes.map((node) => node.id)).toEqual(['__proto__', 'constructor', 'null', 'c4']);
  });

  test('may have a column called __proto__, which is read past and said', async () => {
    const nodes = 'id,label,entry,__proto__\na,a,1,x\nb,b,2,y\n';
    const answer = await send({ nodes, edges: 'source,target\na,b\n' });
    expect(answer.status, answer.text).toBe(201);
    expect(answer.read(dataset).revisions[0]?.report.ignoredColumns).toEqual([
      'nodes.csv: __proto__',
    ]);
  });

  test('of 5,000 nodes and 100,000 edges is read and given back in full', async () => {
    const nodes = ['id,label,entry'];
    const edges = ['source,target'];
    for (let n = 0; n < 5000; n++) nodes.push(`n${n},Node ${n},${n / 3}`);
    for (let n = 0; n < 5000; n++) {
      for (let step = 1; step <= 20; step++) edges.push(`n${n},n${(n + step) % 5000}`);
    }
    const answer = await send({ nodes: nodes.join('\n'), edges: edges.join('\n') });
    expect(answer.status, answer.text).toBe(201);
    const id = answer.read(dataset).revisions[0]?.id ?? '';
    const read = (await owner.get(`${workspacePath}/revisions/${id}`)).read(revision);
    expect(read.nodes[4999]?.entry).toBe(4999 / 3);
    expect(read.edges).toHaveLength(100_000);
    expect(new Set(read.edges.map(String)).size).toBe(100_000);
  });

  test.each([
    ['mixed line ends', NODES_CSV.replace('1\n', '1\r\n'), EDGES_CSV.replaceAll('\n', '\r\n')],
    ['a byte order mark', `\ufeff${NODES_CSV}`, `\ufeff${EDGES_CSV}`],
    ['no edges', NODES_CSV, 'source,target\n'],
    ['one node', 'id,entry\na,1\n', 'source,target\n'],
    ['two nodes', 'id,entry\na,1\nb,1\n', 'source,target\na,b\n'],
  ])('may have %s', async (_kind, nodes, edges) => {
    const answer = await send({ nodes, edges });
    expect(answer.status, answer.text).toBe(201);
  });

  test('may come in pieces without a length, under any file name', async () => {
    const names = ['../../etc/passwd', 'a\\"b.csv', 'n'.repeat(300), '%0d%0aSet-Cookie: x=1', ''];
    for (const name of names.filter(Boolean)) {
      const bytes = Buffer.from(whole(name));
      const pieces = Array.from({ length: Math.ceil(bytes.length / 7) }, (_, n) =>
        bytes.subarray(7 * n, 7 * n + 7),
      );
      const answer = await raw(pieces, { ...multipart, 'transfer-encoding': 'chunked' });
      expect(answer?.status, `${name}: ${answer?.text}`).toBe(201);
    }
  });
});

describe('a wrong file is refused with file, line and field, and nothing is saved', () => {
  const wrong: readonly (readonly [string, string, string, object])[] = [
    [
      'an entry that is no number',
      'id,entry\na,1\nb,abc\n',
      EDGES_CSV,
      { line: 3, field: 'entry' },
    ],
    ['a missing entry', 'id,entry\na,1\nb,\n', EDGES_CSV, { line: 3, field: 'entry' }],
    ['NaN', 'id,entry\na,NaN\n', EDGES_CSV, { line: 2, field: 'entry' }],
    ['infinity', 'id,entry\na,1e309\n', EDGES_CSV, { line: 2, field: 'entry' }],
    ['a hexadecimal number', 'id,entry\na,0x10\n', EDGES_CSV, { line: 2, field: 'entry' }],
    ['30 February', 'id,entry\na,2023-02-30\n', EDGES_CSV, { line: 2, field: 'entry' }],
    ['a repeated id', 'id,entry\na,1\na,2\n', EDGES_CSV, { line: 3, field: 'id' }],
    ['a reversed window', 'id,entry,earliest,latest\na,2,3,1\n', EDGES_CSV, { line: 2 }],
    ['no column entry', 'id\na\n', EDGES_CSV, { line: 1, field: 'entry' }],
    ['a repeated column', 'id,entry,entry\na,1,1\n', EDGES_CSV, { line: 1 }],
    ['a ragged row', 'id,entry\na,1\nb\n', EDGES_CSV, { line: 3 }],
    ['an unclosed quote', 'id,entry\n"a,1\n', EDGES_CSV, { file: 'nodes.csv' }],
    ['nothing in it', '', EDGES_CSV, { file: 'nodes.csv' }],
    ['a header only', 'id,entry\n', EDGES_CSV, { file: 'nodes.csv' }],
    ['a NUL', 'id,entry\na\u0000b,1\n', EDGES_CSV, { line: 2 }],
    [
      'an edge to a missing node',
      NODES_CSV,
      'source,target\na,b\na,zz\n',
      { file: 'edges.csv', line: 3, field: 'target' },
    ],
    ['no edge header', NODES_CSV, 'a,b\n', { file: 'edges.csv', line: 1 }],
    ['no edges file content', NODES_CSV, '', { file: 'edges.csv' }],
  ];
  test.each(wrong)('%s', async (_kind, nodes, edges, issue) => {
    await nothingSaved(async () => {
      const { status, problem } = await send({ nodes, edges });
      expect(status).toBe(422);
      expect(problem.code).toBe('datasets.wrong_files');
      expect(problem.issues).toContainEqual(
        expect.objectContaining({ file: 'nodes.csv', ...issue }),
      );
      expect(problem.issues?.every(({ message }) => message.length > 10)).toBe(true);
    });
  });

  test('everything wrong in both files is listed, and what is past the list is counted', async () => {
    const nodes = ['id,entry', ...Array.from({ length: 1000 }, (_, n) => `n${n},x`), 'a,1'];
    await nothingSaved(async () => {
      const { problem } = await send({ nodes: nodes.join('\n'), edges: 'source,target\na,q\n' });
      const count = (problem.issues?.length ?? 0) + (problem.issuesLeftOut ?? 0);
      expect(count).toBeGreaterThanOrEqual(1000);
      expect(problem.issues?.length).toBeLessThanOrEqual(200);
    });
  });

  test.each([
    ['a PNG', Buffer.from('89504e470d0a1a0a0000000d49484452', 'hex')],
    ['random bytes', randomBytes(4096)],
    ['UTF-16', Buffer.from(`\ufeff${NODES_CSV}`, 'utf16le')],
    ['a gzip bomb', gzipSync(Buffer.alloc(5_000_000))],
    ['Latin-1', Buffer.from('id,label,entry\na,\xe4\xf6,1\n', 'latin1')],
    ['one line of a megabyte and more', Buffer.from(`id,entry\n${'a'.repeat(1_100_000)},1\n`)],
    ['a label of 400 characters', Buffer.from(`id,label,entry\na,${'b'.repeat(400)},1\n`)],
    [
      '5,001 nodes',
      Buffer.from(`id,entry\n${Array.from({ length: 5001 }, (_, n) => `${n},1\n`).join('')}`),
    ],
  ])('%s', async (_kind, bytes) => {
    await nothingSaved(async () => {
      const { status, problem } = await send({ nodes: new Blob([new Uint8Array(bytes)]) });
      expect(status).toBe(422);
      expect(problem.issues?.[0]?.file).toBe('nodes.csv');
    });
  });

  test('one byte over the cap names the file and the limit; the cap itself passes the door', async () => {
    const line = `${'x'.repeat(999)}\n`;
    const padded = (bytes: number) => {
      const body = line.repeat(Math.ceil(bytes / line.length)).slice(0, bytes);
      return new Blob([body]);
    };
    await nothingSaved(async () => {
      const over = await send({ edges: padded(UPLOAD_LIMITS.fileBytes + 1) });
      expect(over.status).toBe(413);
      expect(over.problem.code).toBe('uploads.file_too_large');
      expect(over.problem.detail).toContain('edges.csv');
      expect(over.problem.detail).toContain('50 MiB');
      const exactly = await send({ edges: padded(UPLOAD_LIMITS.fileBytes) });
      expect(exactly.status).toBe(422);
      expect(exactly.problem.issues?.[0]?.file).toBe('edges.csv');
    });
  });
});

describe('a wrong form is refused, and nothing is saved', () => {
  test('a missing file is named by its field', async () => {
    await nothingSaved(async () => {
      const { status, problem } = await send({ nodes: null, edges: null });
      expect(status).toBe(422);
      expect(problem.issues?.map(({ field }) => field)).toEqual(['nodes', 'edges']);
    });
  });

  test.each([
    ['without a name', () => networkForm({ name: null }), 'name'],
    ['with an empty name', () => networkForm({ name: '  ' }), 'name'],
    ['with a long name', () => networkForm({ name: 'n'.repeat(161) }), 'name'],
    ['with a name of a megabyte', () => networkForm({ name: 'n'.repeat(1_000_000) }), 'name'],
    ['with a NUL in its name', () => networkForm({ name: 'a\u0000' }), 'name'],
    ['that sets a workspace', () => withField('workspaceId', 'x'), 'workspaceId'],
    ['that sets invented', () => withField('invented', 'true'), 'invented'],
    ['with a field __proto__', () => withField('__proto__', 'x'), '__proto__'],
    ['with a field twice', () => withField('name', 'Other'), 'name'],
    ['with a file as text', () => withText('nodes'), 'nodes'],
    ['with a file under another name', () => withFile('matrix'), 'matrix'],
    ['with a file twice', () => withFile('nodes'), 'nodes'],
  ])('%s', async (_kind, form, field) => {
    await nothingSaved(async () => {
      const { status, problem } = await owner.ask(path, { form: form() });
      expect(status).toBe(422);
      expect(problem.issues?.map((issue) => issue.field)).toContain(field);
    });
  });

  const withField = (name: string, value: string) => {
    const form = networkForm();
    form.append(name, value);
    return form;
  };
  const withText = (name: string) => {
    const form = networkForm();
    form.set(name, 'id,entry');
    return form;
  };
  const withFile = (name: string) => {
    const form = networkForm();
    form.append(name, new Blob([NODES_CSV]), 'x.csv');
    return form;
  };

  const body = Buffer.from(whole());
  test.each([
    ['cut short', [body.subarray(0, -40)], multipart, 400],
    ['empty', [], { ...multipart, 'content-length': '0' }, 400],
    ['without its boundary', [body], { 'content-type': 'multipart/form-data' }, 415],
    ['with an empty boundary', [body], { 'content-type': 'multipart/form-data; boundary=' }, 400],
    ['as JSON', [Buffer.from('{}')], { 'content-type': 'application/json' }, 415],
    ['of no type', [body], {}, 415],
    ['compressed', [gzipSync(body)], { ...multipart, 'content-encoding': 'gzip' }, 415],
  ])('%s', async (_kind, pieces, headers, status) => {
    await nothingSaved(async () => {
      const answer = await raw(pieces, headers);
      expect(answer?.status, answer?.text).toBe(status);
      expect(answer?.text).toContain('"code":');
    });
  });

  test('with a thousand parts', async () => {
    const many = Array.from({ length: 1000 }, (_, n) => part(`name="f${n}"`, 'x')).join('');
    const answer = await raw([Buffer.from(many + whole())], multipart);
    expect(answer?.status).toBe(422);
  });

  test('that ends early leaves no file behind', async () => {
    await nothingSaved(async () => {
      expect(await raw([body.subarray(0, -1)], multipart, 'abort')).toBeNull();
      await expect.poll(left, { timeout: 5000 }).toEqual([]);
    });
  });

  test('larger than two files can be is cut off while it comes', async () => {
    const chunk = Buffer.alloc(1024 * 1024, 'x');
    const start = Buffer.from(
      `--${BOUNDARY}\r\nContent-Disposition: form-data; name="nodes"; filename="n"\r\n\r\n`,
    );
    const answer = await raw([start, ...Array<Buffer>(120).fill(chunk)], multipart);
    // The server answers before the client has sent everything; a client may miss the answer.
    expect([413, undefined]).toContain(answer?.status);
    await expect.poll(left, { timeout: 5000 }).toEqual([]);
  });
});

describe('a new revision', () => {
  const bring = async () => (await send({})).read(dataset);

  test('gets the next number, and the list holds the newest first', async () => {
    const { id } = await bring();
    const form = networkForm({ name: null, edges: 'source,target\na,b\n' });
    const answer = await owner.ask(`${path}/${id}/revisions`, { form });
    expect(answer.status).toBe(201);
    expect(answer.read(dataset).revisions.map(({ number }) => number)).toEqual([2, 1]);
  });

  test('with the content of the latest is refused, however its lines are ended', async () => {
    const { id } = await bring();
    const form = networkForm({ name: null, nodes: NODES_CSV.replaceAll('\n', '\r\n') });
    const { status, problem } = await owner.ask(`${path}/${id}/revisions`, { form });
    expect(status).toBe(409);
    expect(problem.code).toBe('revisions.same_content');
    expect(problem.detail).toContain('revision 1');
  });

  test('sent twice at once is saved once', async () => {
    const { id } = await bring();
    const once = () =>
      owner.ask(`${path}/${id}/revisions`, {
        form: networkForm({ name: null, edges: 'source,target\na,c\n' }),
      });
    const answers = await Promise.all([once(), once(), once()]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409]);
  });

  test('takes no name', async () => {
    const { id } = await bring();
    const { status, problem } = await owner.ask(`${path}/${id}/revisions`, { form: networkForm() });
    expect(status).toBe(422);
    expect(problem.issues?.[0]?.field).toBe('name');
  });
});
