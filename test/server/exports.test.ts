import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { eq } from 'drizzle-orm';
import { datasets } from '../../db/schema/index';
import { dataset } from '../../server/contract/datasets';
import { EXPORT_KINDS, originalFiles } from '../../server/contract/exports';
import { NASTY_LABELS } from '../formats/writers/networks';
import { EDGES_CSV } from '../support/factories';
import { Importing } from '../support/importing';

let by: Importing;
beforeAll(async () => {
  by = await Importing.open();
});
afterAll(() => by.up.app.close());
afterEach(() => by.up.nothingLeft());

const quoted = (text: string) => `"${text.replaceAll('"', '""')}"`;
/** Labels of every kind that a file can hold, ties, negative entries, windows on either side. */
const HOSTILE = {
  'nodes.csv': `id,label,entry,earliest,latest\n${NASTY_LABELS.map(
    (label, i) =>
      `n${i},${quoted(label)},${(i % 7) - 3}.5,${i % 3 === 0 ? (i % 7) - 5 : ''},${i % 4 === 0 ? 9 : ''}`,
  ).join('\n')}\n`,
  'edges.csv': `source,target,weight\n${NASTY_LABELS.slice(1)
    .map((_, i) => `n${i},n${i + 1},${i % 5 === 0 ? '' : i / 10}`)
    .join('\n')}\n`,
};
const DATES = {
  'nodes.csv':
    'id,label,entry,earliest,latest\n__proto__,Ash,2021-03-01,2021-02-27,2021-03-04\nb,Beech,2021-03-01,,\nc,Cedar,2020-02-29,2020-02-28,\n',
  'edges.csv': 'source,target\n__proto__,b\nc,b\n',
};

describe('a revision as it was understood', () => {
  test.each([
    ['hostile labels, ties, windows and weights', HOSTILE],
    ['dates with windows', DATES],
  ])('brought in again has the same content hash: %s', async (name, files) => {
    const saved = await by.saved(await by.begin(files), { name });
    const hash = await hashOf(saved);
    const texts = await exported(saved.revisionId);
    const copies: Readonly<Record<string, string>>[] = [
      { 'nodes.csv': texts.nodes_csv, 'edges.csv': texts.edges_csv },
      { 'network.graphml': texts.graphml },
      { 'network.json': texts.node_link },
    ];
    for (const again of copies) {
      const draft = await by.begin(again);
      const copy = await by.saved(draft, { name: `${name} again` });
      expect(await hashOf(copy), Object.keys(again).join()).toBe(hash);
    }
  });

  test('is named by its dataset and revision, and never run by a browser', async () => {
    const saved = await by.saved(await by.begin(DATES), { name: 'Fen/1 "west"' });
    const answer = await by.client.get(pathOf(saved.revisionId, 'export/nodes_csv'));
    expect(answer.headers.get('content-disposition')).toContain('Fen 1 west revision 1 nodes.csv');
    expect(answer.headers.get('x-content-type-options')).toBe('nosniff');
  });

  test('has a name that ends with what it is, however long the name of the dataset', async () => {
    const name = '👩🏽‍🔬'.repeat(20) + 'é'.repeat(40);
    const saved = await by.saved(await by.begin(DATES), { name });
    const answer = await by.client.get(pathOf(saved.revisionId, 'export/edges_csv'));
    expect(answer.status).toBe(200);
    const header = answer.headers.get('content-disposition') ?? '';
    const named = decodeURIComponent(/filename\*=UTF-8''([^;]+)/.exec(header)?.[1] ?? '');
    expect(named).toMatch(/^👩.*… ?é+ revision 1 edges\.csv$/u);
  });

  test('is refused by name of the text where the format cannot hold it', async () => {
    const json = JSON.stringify({
      nodes: [
        { id: 'a', label: 'odd \uffff', entry: 1 },
        { id: 'b', label: 'b', entry: 2 },
      ],
      links: [{ source: 'a', target: 'b' }],
    });
    const saved = await by.saved(await by.begin({ 'n.json': json }), { name: 'Odd' });
    const { status, problem } = await by.client.get(pathOf(saved.revisionId, 'export/graphml'));
    expect([status, problem.code]).toEqual([409, 'revisions.unwritable']);
    expect(problem.detail).toMatch(/odd .*JSON or CSV/);
    expect((await by.client.get(pathOf(saved.revisionId, 'export/node_link'))).status).toBe(200);
  });

  test('in a kind that is none is not there', async () => {
    const saved = await by.saved(await by.begin(DATES), { name: 'Kinds' });
    const answer = await by.client.get(pathOf(saved.revisionId, 'export/pdf'));
    expect(answer.status).toBe(404);
  });
});

describe('the files that came in', () => {
  test('are kept byte for byte', async () => {
    const bytes = Uint8Array.of(0xff, 0xfe, ...utf16('id;entry\r\na;1,5\r\nb;2\r\n'));
    const files = { 'Größe "a".csv': new Blob([bytes]), 'edges.csv': 'source,target\na,b\n' };
    const saved = await by.saved(await by.begin(files), { name: 'Bytes' });
    const listed = (await by.client.get(pathOf(saved.revisionId, 'originals'))).read(originalFiles);
    expect(listed.files.map(({ bytes: size }) => size)).toEqual([bytes.length, 18]);
    const answer = await by.client.get(pathOf(saved.revisionId, 'originals/0'));
    expect(new Uint8Array(answer.bytes)).toEqual(bytes);
    expect(answer.headers.get('content-disposition')).toMatch(/^attachment; filename=/);
    expect(answer.headers.get('content-type')).toBe('application/octet-stream');
    expect(answer.headers.get('x-content-type-options')).toBe('nosniff');
    expect((await by.client.get(pathOf(saved.revisionId, 'originals/2'))).status).toBe(404);
  });

  test('are kept for the plain upload of two tables, too', async () => {
    const made = (await by.up.send({})).read(dataset);
    const id = made.revisions[0]?.id ?? '';
    const { files } = (await by.client.get(pathOf(id, 'originals'))).read(originalFiles);
    expect(files.map(({ name }) => name)).toEqual(['nodes.csv', 'edges.csv']);
    expect((await by.client.get(pathOf(id, 'originals/1'))).text).toBe(EDGES_CSV);
  });
});

test('a revision of a deleted dataset is not there', async () => {
  const saved = await by.saved(await by.begin(DATES), { name: 'Gone' });
  await by.up.app.db
    .update(datasets)
    .set({ deletedAt: new Date() })
    .where(eq(datasets.id, saved.datasetId));
  for (const end of ['export/graphml', 'originals', 'originals/0']) {
    expect((await by.client.get(pathOf(saved.revisionId, end))).status, end).toBe(404);
  }
});

const pathOf = (revisionId: string, end: string) =>
  `${by.up.workspacePath}/revisions/${revisionId}/${end}`;

async function exported(revisionId: string) {
  const texts = await Promise.all(
    EXPORT_KINDS.map(async (kind) => {
      const answer = await by.client.get(pathOf(revisionId, `export/${kind}`));
      expect(answer.status).toBe(200);
      return [kind, answer.text] as const;
    }),
  );
  return Object.fromEntries(texts) as Record<(typeof EXPORT_KINDS)[number], string>;
}

async function hashOf({ datasetId }: { datasetId: string }): Promise<string> {
  const kept = (await by.client.get(`${by.up.path}/${datasetId}`)).read(dataset);
  return kept.revisions[0]?.contentHash ?? '';
}

const utf16 = (text: string): number[] =>
  [...text].flatMap((letter) => [letter.charCodeAt(0) & 255, letter.charCodeAt(0) >> 8]);
