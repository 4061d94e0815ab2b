import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { dataset, revision } from '../../server/contract/datasets';
import { networkForm, NODES_CSV, EDGES_CSV } from '../support/factories';
import { MULTIPART, Uploading, wholeForm } from '../support/uploading';

let up: Uploading;
beforeAll(async () => {
  up = await Uploading.open();
});
afterAll(() => up.app.close());
afterEach(() => up.nothingLeft());

describe('a network that is right', () => {
  test('becomes a dataset with revision 1, and what was folded is said', async () => {
    const nodes =
      'id,label,entry,earliest,latest,habitat\na,Ä,1.5,1,2,reed\nb,b,1.5,,,\nc,,-3,,,\n';
    const edges = 'source,target\na,b\nb,a\na,b\nc,c\n';
    const answer = await up.send({ name: ' Fen ', nodes, edges });
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
    const read = (await up.owner.get(`${up.workspacePath}/revisions/${id}`)).read(revision);
    expect(read.edges).toEqual([[0, 1]]);
    const noWindow = { earliest: null, earliestRaw: '', latest: null, latestRaw: '' };
    expect(read.nodes).toEqual([
      {
        id: 'a',
        label: 'Ä',
        entryRaw: '1.5',
        entry: 1.5,
        earliest: 1,
        earliestRaw: '1',
        latest: 2,
        latestRaw: '2',
      },
      { id: 'b', label: 'b', entryRaw: '1.5', entry: 1.5, ...noWindow },
      { id: 'c', label: 'c', entryRaw: '-3', entry: -3, ...noWindow },
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
    const answer = await up.send({
      nodes: [nodes[0], ...rows].join('\n'),
      edges: 'source,target\n__proto__,constructor\n',
    });
    expect(answer.status, answer.text).toBe(201);
    const id = answer.read(dataset).revisions[0]?.id ?? '';
    const read = (await up.owner.get(`${up.workspacePath}/revisions/${id}`)).read(revision);
    expect(read.nodes.map(({ label }) => label)).toEqual(labels);
    expect(read.nodes.map((node) => node.id)).toEqual(['__proto__', 'constructor', 'null', 'c4']);
  });

  test('may have a column called __proto__, which is read past and said', async () => {
    const nodes = 'id,label,entry,__proto__\na,a,1,x\nb,b,2,y\n';
    const answer = await up.send({ nodes, edges: 'source,target\na,b\n' });
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
    const answer = await up.send({ nodes: nodes.join('\n'), edges: edges.join('\n') });
    expect(answer.status, answer.text).toBe(201);
    const id = answer.read(dataset).revisions[0]?.id ?? '';
    const read = (await up.owner.get(`${up.workspacePath}/revisions/${id}`)).read(revision);
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
    const answer = await up.send({ nodes, edges });
    expect(answer.status, answer.text).toBe(201);
  });

  test('may come in pieces without a length, under any file name', async () => {
    const names = ['../../etc/passwd', 'a\\"b.csv', 'n'.repeat(300), '%0d%0aSet-Cookie: x=1', ''];
    for (const name of names.filter(Boolean)) {
      const bytes = Buffer.from(wholeForm(name));
      const pieces = Array.from({ length: Math.ceil(bytes.length / 7) }, (_, n) =>
        bytes.subarray(7 * n, 7 * n + 7),
      );
      const answer = await up.raw(pieces, { ...MULTIPART, 'transfer-encoding': 'chunked' });
      expect(answer?.status, `${name}: ${answer?.text}`).toBe(201);
    }
  });
});

describe('a new revision', () => {
  const bring = async () => (await up.send({})).read(dataset);

  test('gets the next number, and the list holds the newest first', async () => {
    const { id } = await bring();
    const form = networkForm({ name: null, edges: 'source,target\na,b\n' });
    const answer = await up.owner.ask(`${up.path}/${id}/revisions`, { form });
    expect(answer.status).toBe(201);
    expect(answer.read(dataset).revisions.map(({ number }) => number)).toEqual([2, 1]);
  });

  test('with the content of the latest is refused, however its lines are ended', async () => {
    const { id } = await bring();
    const form = networkForm({ name: null, nodes: NODES_CSV.replaceAll('\n', '\r\n') });
    const { status, problem } = await up.owner.ask(`${up.path}/${id}/revisions`, { form });
    expect(status).toBe(409);
    expect(problem.code).toBe('revisions.same_content');
    expect(problem.detail).toContain('revision 1');
  });

  test('sent twice at once is saved once', async () => {
    const { id } = await bring();
    const once = () =>
      up.owner.ask(`${up.path}/${id}/revisions`, {
        form: networkForm({ name: null, edges: 'source,target\na,c\n' }),
      });
    const answers = await Promise.all([once(), once(), once()]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409]);
  });

  test('takes no name', async () => {
    const { id } = await bring();
    const { status, problem } = await up.owner.ask(`${up.path}/${id}/revisions`, {
      form: networkForm(),
    });
    expect(status).toBe(422);
    expect(problem.issues?.[0]?.field).toBe('name');
  });
});
