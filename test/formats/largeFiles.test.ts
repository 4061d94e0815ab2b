import { execFile } from 'node:child_process';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { describe, expect, test } from 'vitest';
import { z } from 'zod';

/** Megabytes of heap in which every file is brought in, the file itself aside. */
const HEAP = 128;

const printed = z.object({
  nodes: z.number(),
  edges: z.number(),
  edgeRows: z.number(),
  says: z.string(),
  bytes: z.number(),
});

async function bringLarge(kind: string) {
  const { stdout } = await promisify(execFile)(process.execPath, [
    `--max-old-space-size=${HEAP}`,
    '--import',
    'tsx',
    join(import.meta.dirname, 'largeFile.ts'),
    kind,
  ]);
  return printed.parse(JSON.parse(stdout));
}

describe(`a large file is brought in, or refused, within ${HEAP} MB of heap`, () => {
  test.each([
    ['edges', { nodes: 5000, edgeRows: 1_600_000, says: '' }],
    ['times', { nodes: 5000, edgeRows: 400_000, says: '' }],
    ['lines', { nodes: 57, edges: 350, edgeRows: 1_900_000, says: '' }],
    ['links', { nodes: 5000, edgeRows: 550_000, says: '' }],
    ['layout', { nodes: 5000, edgeRows: 300_000, says: '' }],
    ['quotes', { nodes: 0, says: expect.stringMatching(/inside a cell/) as unknown }],
    ['matrix', { nodes: 0, says: expect.stringMatching(/6126750 edges/) as unknown }],
  ])('%s', async (kind, expected) => {
    const found = await bringLarge(kind);
    expect(found).toMatchObject(expected);
    expect(found.bytes).toBeGreaterThan(15e6);
  });
});
