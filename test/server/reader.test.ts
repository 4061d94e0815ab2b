import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pino } from 'pino';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { makeReader, type Reader } from '../../server/reading/reader';
import { Failure } from '../../server/http/failure';
import { buildReadingScript } from '../support/readingScript';
import { EDGES_CSV, NODES_CSV } from '../support/factories';

const log = pino({ level: 'silent' });
let folder: string;
let built: Awaited<ReturnType<typeof buildReadingScript>>;
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'heddle-test-'));
  built = await buildReadingScript();
});
afterAll(() => {
  rmSync(folder, { recursive: true, force: true });
  built.remove();
});

const file = (name: string, content: string): string => {
  const path = join(folder, name);
  writeFileSync(path, content);
  return path;
};

/** A process that behaves once it is given an empty file of nodes. */
const misbehaving = (name: string, statement: string): string =>
  file(
    name,
    `import { statSync } from 'node:fs';
     process.on('message', ({ nodesPath }) => {
       if (statSync(nodesPath).size > 0) ${statement}
       process.send({ kind: 'problems', issues: [], leftOut: 0 });
     });`,
  );

async function codeOf(reader: Reader, nodes: string): Promise<string> {
  const paths = { folder, nodesPath: file('n.csv', nodes), edgesPath: file('e.csv', EDGES_CSV) };
  try {
    await reader.read(paths);
    return 'read';
  } catch (error) {
    return error instanceof Failure ? error.code : String(error);
  }
}

test('a network is read in a process of its own', async () => {
  const reader = makeReader({ script: built.script, log });
  expect(await codeOf(reader, NODES_CSV)).toBe('read');
  expect(await codeOf(reader, 'id,entry\n')).toBe('datasets.wrong_files');
  await reader.close();
});

test.each([
  ['time', 'for (;;);', 'datasets.too_slow_to_read'],
  [
    'memory',
    'for (const all = []; ; ) all.push(Array.from({ length: 1000 }, Math.random));',
    'datasets.too_large_to_read',
  ],
  [
    'buffers',
    'for (const all = []; ; ) all.push(Buffer.alloc(1e6, 1));',
    'datasets.too_large_to_read',
  ],
  ['ended', 'process.abort();', 'datasets.not_readable'],
  ['left', 'process.exit(0);', 'datasets.not_readable'],
])('reading that fails (%s) ends alone, and the next is read', async (name, statement, code) => {
  const script = misbehaving(`${name}.mjs`, statement);
  const reader = makeReader({
    script,
    log,
    heap: 32,
    resident: 300,
    time: name === 'time' ? 0.5 : 60,
  });
  let ticks = 0;
  const ticking = setInterval(() => ticks++, 20);
  expect(await codeOf(reader, NODES_CSV)).toBe(code);
  clearInterval(ticking);
  // The thread that answers requests went on meanwhile.
  expect(ticks).toBeGreaterThan(0);
  expect(await codeOf(reader, '')).toBe('datasets.wrong_files');
  await reader.close();
});

test('more readings than may wait are refused for now', async () => {
  const script = misbehaving('slow.mjs', 'for (;;);');
  const reader = makeReader({ script, log, time: 0.3 });
  const codes = await Promise.all(Array.from({ length: 12 }, () => codeOf(reader, NODES_CSV)));
  // One is read and eight wait for their turn, each with its own time.
  expect(codes.filter((code) => code === 'datasets.too_slow_to_read')).toHaveLength(9);
  expect(codes.filter((code) => code === 'service.busy')).toHaveLength(3);
  await reader.close();
});
