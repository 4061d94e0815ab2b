import { randomBytes } from 'node:crypto';
import { gzipSync } from 'node:zlib';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { imports } from '../../db/schema/index';
import { IMPORT_LIMITS, importDraft } from '../../server/contract/imports';
import { EDGES_CSV, NODES_CSV } from '../support/factories';
import { Importing } from '../support/importing';
import { BOUNDARY, MULTIPART, part } from '../support/uploading';

let by: Importing;
beforeAll(async () => {
  by = await Importing.open();
});
afterAll(() => by.up.app.close());
afterEach(() => by.up.nothingLeft());

const blob = (bytes: Uint8Array) => new Blob([new Uint8Array(bytes)]);
const PNG = Buffer.from('89504e470d0a1a0a0000000d4948445200000001000000010806000000', 'hex');

describe('a file that is no network makes a draft that says what is wrong with it', () => {
  test.each([
    ['a PNG called .graphml', 'fen.graphml', PNG],
    ['gzip', 'nodes.csv.gz', gzipSync(NODES_CSV)],
    ['a gzip bomb', 'nodes.csv', gzipSync(Buffer.alloc(5_000_000))],
    ['random bytes', 'nodes.csv', randomBytes(4096)],
    ['nothing', 'nodes.csv', Buffer.alloc(0)],
    ['a NUL', 'nodes.csv', Buffer.from('id,entry\na\u0000b,1\n')],
    ['an unclosed quote', 'nodes.csv', Buffer.from('id,entry\n"a,1\n')],
    ['a label of a megabyte', 'nodes.csv', Buffer.from(`id,label,entry\na,${'b'.repeat(1e6)},1\n`)],
  ])('%s', async (_what, name, bytes) => {
    const draft = await by.begin({ [name]: blob(bytes) });
    expect(draft.ready).toBe(false);
    expect(draft.growth).toBeNull();
    expect(draft.issues[0]?.file).toBe(name);
    expect(draft.issues[0]?.message.length).toBeGreaterThan(10);
    const csv = await by.client.get(`${by.path}/${draft.id}/problems.csv`);
    expect(csv.status).toBe(200);
    expect(csv.text.split('\n')[0]).toBe('file,line,column,problem');
    expect(csv.text.split('\n')[1]).toContain(name);
  });

  test('one line of 50 MB', async () => {
    const bytes = Buffer.alloc(IMPORT_LIMITS.fileBytes, 'a');
    const draft = await by.begin({ 'line.csv': blob(bytes) });
    expect(draft.ready).toBe(false);
    expect(draft.issues[0]).toMatchObject({ file: 'line.csv' });
  });
});

test('UTF-16 with a byte order mark is read like UTF-8', async () => {
  const draft = await by.begin({
    'nodes.csv': blob(Buffer.from(`\ufeff${NODES_CSV}`, 'utf16le')),
    'edges.csv': EDGES_CSV,
  });
  expect(draft.files[0]?.reading?.encoding).toBe('utf-16le');
  expect(draft).toMatchObject({ ready: true, found: { nodes: 3, edges: 2 } });
});

test('every problem is in problems.csv, the draft shows the first', async () => {
  const rows = Array.from({ length: 1000 }, (_, n) => `n${n},=x${n}`);
  const draft = await by.begin({ 'n.csv': ['id,entry', ...rows].join('\n') });
  const { columns } = draft.choices;
  const chosen = await by.change(draft.id, {
    choices: {
      ...draft.choices,
      order: { kind: 'column' },
      columns: { ...columns, nodes: { ...columns.nodes, entry: 'entry' } },
    },
  });
  expect(chosen.issues).toHaveLength(200);
  expect(chosen.issuesLeftOut).toBe(800);
  const csv = await by.client.get(`${by.path}/${draft.id}/problems.csv`);
  expect(csv.headers.get('content-disposition')).toBe('attachment; filename="n problems.csv"');
  const lines = csv.text.trimEnd().split('\n');
  expect(lines).toHaveLength(1001);
  expect(lines.at(-1)).toMatch(/^n\.csv,1001,entry,/);
});

test('labels that are formulas, markup or marks stay text', async () => {
  const draft = await by.begin({
    'n.csv': 'id,label,entry\n__proto__,"=HYPERLINK(""x"")",1\nconstructor,<img onerror=x>,2\n',
  });
  expect(draft.ready).toBe(true);
  expect(draft.growth?.labels).toEqual(['=HYPERLINK("x")', '<img onerror=x>']);
});

describe('names of files', () => {
  test.each([
    ['with folders', '../../etc/passwd', 'passwd'],
    ['with quotes', 'a%22b.csv', 'a%22b.csv'],
    ['of 300 characters', `${'n'.repeat(300)}.csv`, 'n'.repeat(120)],
    ['with line ends', 'a%0D%0ASet-Cookie: x=1', 'a%0D%0ASet-Cookie: x=1'],
    ['with marks of direction', 'a\u202eb.csv', 'a b.csv'],
    ['of marks alone', '\u202e', 'File 1'],
  ])('%s are kept as plain text', async (_what, name, shown) => {
    const body = `${part(`name="files"; filename="${name}"`, 'a,b\n')}--${BOUNDARY}--\r\n`;
    const answer = await by.up.raw([Buffer.from(body)], MULTIPART, 'end', by.path);
    expect(answer?.status, answer?.text).toBe(201);
    const draft = importDraft.parse(JSON.parse(answer?.text ?? ''));
    expect(draft.files[0]?.name).toBe(shown);
  });

  test('with a NUL make no form', async () => {
    const body = `${part('name="files"; filename="a\u0000b.csv"', 'a,b\n')}--${BOUNDARY}--\r\n`;
    const answer = await by.up.raw([Buffer.from(body)], MULTIPART, 'end', by.path);
    expect(answer?.status).toBe(400);
  });

  test('that are equal are told apart', async () => {
    const same = part('name="files"; filename="a.csv"', 'source,target\na,b\n');
    const body = `${same}${same}--${BOUNDARY}--\r\n`;
    const answer = await by.up.raw([Buffer.from(body)], MULTIPART, 'end', by.path);
    const draft = importDraft.parse(JSON.parse(answer?.text ?? ''));
    expect(draft.files.map(({ name }) => name)).toEqual(['a.csv', 'a.csv (2)']);
    expect(draft.issues[0]?.message).toContain('holds edges already');
  });
});

describe('a form that is wrong is refused and leaves no draft', () => {
  const five = Object.fromEntries([1, 2, 3, 4, 5].map((n) => [`${n}.csv`, 'a,b\n']));
  test.each([
    ['no file', {}, {}],
    ['five files', five, {}],
    ['a field that is not known', { 'a.csv': 'a,b\n' }, { workspaceId: 'x' }],
    ['a dataset that is no id', { 'a.csv': 'a,b\n' }, { datasetId: 'x' }],
    ['a name of 200 characters', { 'a.csv': 'a,b\n' }, { name: 'n'.repeat(200) }],
    ['pasted text with a NUL', {}, { pasted: 'a\u0000,b\n' }],
  ])('%s', async (_what, files, fields) => {
    const before = await by.up.app.db.$count(imports);
    const answer = await by.send(files, fields);
    expect(answer.status, answer.text).toBe(422);
    expect(await by.up.app.db.$count(imports)).toBe(before);
  });

  test('one byte over the cap', async () => {
    const bytes = Buffer.alloc(IMPORT_LIMITS.fileBytes + 1, 'a,b\n');
    const { status, problem } = await by.send({ 'large.csv': blob(bytes) });
    expect([status, problem.code]).toEqual([413, 'uploads.file_too_large']);
    expect(problem.detail).toContain('large.csv');
  });

  test('pasted text over its cap', async () => {
    const answer = await by.send({}, { pasted: 'a,b\n'.repeat(IMPORT_LIMITS.pastedBytes / 4 + 1) });
    expect(answer.status).toBe(422);
  });

  test('cut off in the middle', async () => {
    const before = await by.up.app.db.$count(imports);
    const whole = part('name="files"; filename="a.csv"', NODES_CSV);
    const answer = await by.up.raw([Buffer.from(whole.slice(0, -20))], MULTIPART, 'end', by.path);
    expect(answer?.status).toBe(400);
    await by.up.raw([Buffer.from(whole.slice(0, -20))], MULTIPART, 'abort', by.path);
    expect(await by.up.app.db.$count(imports)).toBe(before);
  });

  test('a change of a file that is not there', async () => {
    const { id } = await by.begin({ 'a.csv': 'source,target\na,b\n' });
    const answer = await by.ask(id, { hints: [{ position: 3, hint: { role: 'nodes' } }] });
    expect(answer.status).toBe(422);
    expect((await by.look(id)).version).toBe(1);
  });
});
