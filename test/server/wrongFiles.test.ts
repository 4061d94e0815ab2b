import { randomBytes } from 'node:crypto';
import { gzipSync } from 'node:zlib';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { UPLOAD_LIMITS } from '../../server/contract/datasets';
import { EDGES_CSV, NODES_CSV } from '../support/factories';
import { Uploading } from '../support/uploading';

let up: Uploading;
beforeAll(async () => {
  up = await Uploading.open();
});
afterAll(() => up.app.close());
afterEach(() => up.nothingLeft());

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
    await up.nothingSaved(async () => {
      const { status, problem } = await up.send({ nodes, edges });
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
    await up.nothingSaved(async () => {
      const { problem } = await up.send({ nodes: nodes.join('\n'), edges: 'source,target\na,q\n' });
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
    await up.nothingSaved(async () => {
      const { status, problem } = await up.send({ nodes: new Blob([new Uint8Array(bytes)]) });
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
    await up.nothingSaved(async () => {
      const over = await up.send({ edges: padded(UPLOAD_LIMITS.fileBytes + 1) });
      expect(over.status).toBe(413);
      expect(over.problem.code).toBe('uploads.file_too_large');
      expect(over.problem.detail).toContain('edges.csv');
      expect(over.problem.detail).toContain('50 MiB');
      const exactly = await up.send({ edges: padded(UPLOAD_LIMITS.fileBytes) });
      expect(exactly.status).toBe(422);
      expect(exactly.problem.issues?.[0]?.file).toBe('edges.csv');
    });
  });
});
