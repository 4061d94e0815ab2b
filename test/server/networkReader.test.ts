import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pino } from 'pino';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { makeNetworkReader, type NetworkReader } from '../../server/datasets/networkReader';
import { Failure } from '../../server/http/failure';
import { buildParseThread } from '../support/parseThread';
import { EDGES_CSV, NODES_CSV } from '../support/factories';

const log = pino({ level: 'silent' });
let folder: string;
let built: Awaited<ReturnType<typeof buildParseThread>>;
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'heddle-test-'));
  built = await buildParseThread();
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

/** A thread that behaves once it is given an empty file of nodes. */
const misbehaving = (name: string, statement: string): string =>
  file(
    name,
    `import { statSync } from 'node:fs';
     export default ({ nodesPath }) => {
       if (statSync(nodesPath).size > 0) ${statement}
       return { issues: [], leftOut: 0 };
     };`,
  );

async function codeOf(reader: NetworkReader, nodes: string): Promise<string> {
  const paths = { nodesPath: file('n.csv', nodes), edgesPath: file('e.csv', EDGES_CSV) };
  try {
    await reader.read(paths);
    return 'read';
  } catch (error) {
    return error instanceof Failure ? error.code : String(error);
  }
}

test('a network is read on a thread', async () => {
  const reader = makeNetworkReader({ script: built.script, log });
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
])('reading that takes too much %s ends alone, and the next is read', async (name, loop, code) => {
  const script = misbehaving(`${name}.mjs`, loop);
  const reader = makeNetworkReader({ script, log, heap: 32, time: name === 'time' ? 0.5 : 60 });
  let ticks = 0;
  const ticking = setInterval(() => ticks++, 20);
  expect(await codeOf(reader, NODES_CSV)).toBe(code);
  clearInterval(ticking);
  // The thread that answers requests went on meanwhile.
  expect(ticks).toBeGreaterThan(3);
  expect(await codeOf(reader, '')).toBe('datasets.wrong_files');
  await reader.close();
});

test('more readings than may wait are refused for now', async () => {
  const script = misbehaving('slow.mjs', 'for (;;);');
  const reader = makeNetworkReader({ script, log, time: 0.3 });
  const codes = await Promise.all(Array.from({ length: 12 }, () => codeOf(reader, NODES_CSV)));
  // One is read and eight wait for their turn, each with its own time.
  expect(codes.filter((code) => code === 'datasets.too_slow_to_read')).toHaveLength(9);
  expect(codes.filter((code) => code === 'service.busy')).toHaveLength(3);
  await reader.close();
});
