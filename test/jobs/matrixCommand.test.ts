import { spawn } from 'node:child_process';
import { mkdirSync, rmSync } from 'node:fs';
import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { parse } from 'csv-parse/sync';
import { build } from 'esbuild';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { z } from 'zod';
import { arrivalOrder, prepare, recordedBarcode, similarity } from '../../jobs/engine/index';
import type { Network } from '../../jobs/engine/types';
import { denseRanks } from '../../jobs/scales';
import { networkOf, randomNetwork, withEntries } from '../support/graphs';
import { directMatrix } from '../support/wholeMatrix';

const root = join(import.meta.dirname, '..', '..');
const built = join(root, 'node_modules', '.cache', `heddle-matrix-${process.pid}`);
let folder = '';

beforeAll(async () => {
  mkdirSync(built, { recursive: true });
  await build({
    absWorkingDir: root,
    entryPoints: { matrix: 'jobs/matrix.ts' },
    outdir: built,
    outExtension: { '.js': '.mjs' },
    bundle: true,
    packages: 'external',
    platform: 'node',
    format: 'esm',
    target: 'node20',
    logLevel: 'error',
  });
});
beforeEach(async () => {
  if (folder) await rm(folder, { recursive: true, force: true });
  folder = await mkdtemp(join(tmpdir(), 'heddle-matrix-'));
});
afterAll(async () => {
  rmSync(built, { recursive: true, force: true });
  await rm(folder, { recursive: true, force: true });
});

interface Ended {
  readonly status: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

/** Runs the built command in the folder of the test. */
function command(...args: string[]): Promise<Ended> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [join(built, 'matrix.mjs'), ...args], { cwd: folder });
    let [stdout, stderr] = ['', ''];
    child.stdout.on('data', (chunk: Buffer) => (stdout += chunk.toString()));
    child.stderr.on('data', (chunk: Buffer) => (stderr += chunk.toString()));
    child.on('error', reject);
    child.on('close', (status) => resolve({ status, stdout, stderr }));
  });
}

const file = (name: string, text: string) => writeFile(join(folder, name), text);
const FILES = ['--nodes', 'nodes.csv', '--edges', 'edges.csv'];

async function write(network: Network): Promise<void> {
  const nodes = Array.from(network.values, (value, row) => `n${row},Node ${row},${value}`);
  const edges = Array.from(
    { length: network.edges.length / 2 },
    (_, e) => `n${network.edges[2 * e]},n${network.edges[2 * e + 1]}`,
  );
  await file('nodes.csv', ['id,label,entry', ...nodes, ''].join('\n'));
  await file('edges.csv', ['source,target', ...edges, ''].join('\n'));
}

const table = z.array(z.record(z.string(), z.string()));
const rowsOf = (text: string) => table.parse(parse(text, { columns: true }));

/** The rows of pairs.csv as the engine gives them when it is called directly. */
function expectedPairs(network: Network, maxDimension: number, chosen: readonly number[]) {
  const order = arrivalOrder(network.values);
  const { nodeCount, values } = network;
  const rows: Record<string, string>[] = [];
  for (const [p, { distances, bettiGaps }] of directMatrix(network, maxDimension)) {
    const width = nodeCount - 1 - p;
    for (let i = 0; i < width; i++) {
      const [a, b] = [order[p] ?? 0, order[p + 1 + i] ?? 0];
      const bound = (values[b] ?? 0) - (values[a] ?? 0);
      const d = Array.from({ length: maxDimension + 1 }, (_, k) => distances[k * width + i] ?? NaN);
      const cell = (list: readonly number[], k: number) =>
        k <= maxDimension ? String(list[k * width + i]) : '';
      rows.push({
        node_a: `n${a}`,
        node_b: `n${b}`,
        bound: String(bound),
        ...Object.fromEntries([0, 1, 2, 3].map((k) => [`d${k}`, cell(distances, k)])),
        ...Object.fromEntries([0, 1, 2, 3].map((k) => [`g${k}`, cell(bettiGaps, k)])),
        similarity: String(similarity(d, bound, chosen)),
      });
    }
  }
  return rows;
}

/** Rows without the raw entries, which the engine does not know. */
const computedPart = (rows: readonly Record<string, string>[]) =>
  rows.map(({ entry_a: _a, entry_b: _b, ...computed }) => computed);

describe('the matrix command on files', () => {
  it.each([
    ['ordered entries, dimension 3', 'constant', 'ordered', 3, [1, 2, 3]],
    ['tied entries, dimension 2', 'geometric', 'tied', 2, [1, 2]],
    ['real entries of both signs, dimension 1', 'rising', 'real', 1, [1]],
    ['dimension 0 alone', 'preferential', 'shuffled', 0, [0]],
  ] as const)('agrees with the engine: %s', async (_, model, kind, dimension, chosen) => {
    const network = withEntries(randomNetwork(model, 17, 11), kind, 5);
    await write(network);
    const ended = await command(...FILES, '--max-dimension', String(dimension));
    expect(ended).toMatchObject({ status: 0, stderr: '' });
    const rows = rowsOf(ended.stdout);
    expect(rows).toHaveLength((17 * 16) / 2);
    expect(computedPart(rows)).toEqual(expectedPairs(network, dimension, chosen));
  });

  it('measures in steps on the scale of ranks, and keeps the entries as they are written', async () => {
    const network = withEntries(randomNetwork('constant', 14, 3), 'realTied', 4);
    await write(network);
    const { stdout } = await command(...FILES, '--scale', 'rank');
    const ranked = { ...network, values: denseRanks(network.values) };
    const rows = rowsOf(stdout);
    expect(computedPart(rows)).toEqual(expectedPairs(ranked, 3, [1, 2, 3]));
    for (const { node_a: id = '', entry_a: entry } of rows) {
      expect(entry).toBe(String(network.values[Number(id.slice(1))]));
    }
  });

  it('takes scale entry, dimension 3 and standard output unless told otherwise', async () => {
    await write(withEntries(randomNetwork('constant', 10, 8), 'real', 2));
    const plain = await command(...FILES);
    const told = ['--scale', 'entry', '--max-dimension', '3', '--pairs', 'pairs.csv'];
    expect(await command(...FILES, ...told)).toEqual({ status: 0, stdout: '', stderr: '' });
    expect(await readFile(join(folder, 'pairs.csv'), 'utf8')).toBe(plain.stdout);
    expect(plain.stdout.split('\n')[0]).toBe(
      'node_a,node_b,entry_a,entry_b,bound,d0,d1,d2,d3,g0,g1,g2,g3,similarity',
    );
  });

  it('writes the recorded barcode with an empty death for a bar that never dies', async () => {
    const network = withEntries(randomNetwork('geometric', 20, 6), 'shuffled', 9);
    await write(network);
    const ended = await command(...FILES, '--barcodes', 'bars.csv');
    expect(ended).toEqual({ status: 0, stdout: '', stderr: '' });
    const limits = { simplices: 1e7, bytes: 2 ** 30 };
    const control = { shouldStop: () => false, onProgress: () => undefined };
    const barcode = recordedBarcode(prepare(network, 3, limits, control));
    const lines = barcode.flatMap(({ births, deaths }, k) =>
      Array.from(births, (birth, i) => {
        const death = deaths[i] ?? NaN;
        return `${k},${birth},${death === Infinity ? '' : death}`;
      }),
    );
    const text = await readFile(join(folder, 'bars.csv'), 'utf8');
    expect(text).toBe(['dimension,birth,death', ...lines, ''].join('\n'));
    expect(lines.some((line) => line.endsWith(','))).toBe(true);
  });

  it('takes dates, and one node has no pairs', async () => {
    await file('nodes.csv', 'id,label,entry\na,A,2024-02-28\nb,B,2024-03-01\n');
    await file('edges.csv', 'source,target\na,b\n');
    const [row] = rowsOf((await command(...FILES)).stdout);
    expect(row).toMatchObject({ entry_a: '2024-02-28', entry_b: '2024-03-01', bound: '2' });
    await file('nodes.csv', 'id,label,entry\na,A,1\n');
    await file('edges.csv', 'source,target\n');
    const alone = await command(...FILES);
    expect([alone.status, rowsOf(alone.stdout)]).toEqual([0, []]);
  });
});

describe('wrong input', () => {
  const GOOD_NODES = 'id,label,entry\na,A,1\nb,B,2\n';
  const GOOD_EDGES = 'source,target\na,b\n';
  beforeEach(async () => {
    await file('nodes.csv', GOOD_NODES);
    await file('edges.csv', GOOD_EDGES);
  });

  it.each([
    [['--edges', 'edges.csv'], '--nodes is missing; name the file with the nodes.'],
    [['--nodes', 'nodes.csv'], '--edges is missing; name the file with the edges.'],
    [[...FILES, '--scale', 'days'], '--scale is "days"; write entry or rank.'],
    [[...FILES, '--max-dimension', '4'], '--max-dimension is "4"; write 0, 1, 2 or 3.'],
    [[...FILES, '--max-dimension', '1.5'], '--max-dimension is "1.5"; write 0, 1, 2 or 3.'],
    [
      [...FILES, '--pairs', 'nodes.csv'],
      '--pairs is a file that is read (nodes.csv); name another.',
    ],
    [
      [...FILES, '--pairs', 'x.csv', '--barcodes', 'x.csv'],
      '--pairs and --barcodes are the same file (x.csv); name two.',
    ],
    [[...FILES, '--depth', '3'], "Unknown option '--depth'. Ask with --help what may be written."],
    [[...FILES, 'more'], "Unexpected argument 'more'. Ask with --help what may be written."],
  ])('a wrong call %j ends with status 2 and one sentence', async (args, sentence) => {
    expect(await command(...args)).toEqual({ status: 2, stdout: '', stderr: `${sentence}\n` });
    expect(await readFile(join(folder, 'nodes.csv'), 'utf8')).toBe(GOOD_NODES);
  });

  it('lists every fault by file, line and column, and writes nothing', async () => {
    await file('nodes.csv', 'id,label,entry\na,A,1\nb,B,soon\na,C,3\n');
    await file('edges.csv', 'source,target\na,b\na,zebra\n');
    const { status, stdout, stderr } = await command(...FILES, '--pairs', 'pairs.csv');
    expect([status, stdout]).toEqual([1, '']);
    const lines = stderr.trimEnd().split('\n');
    expect(lines[0]).toMatch(/^nodes\.csv, line 3, entry: “soon” is neither a plain number/);
    expect(lines[1]).toMatch(/^nodes\.csv, line 4, id: The id “a” stands already on line 2\./);
    expect(lines[2]).toMatch(/^edges\.csv, line 3, target: No node has the id “zebra”\./);
    expect(lines[3]).toBe(
      'The files have 3 faults; nothing was computed. Correct them, then try again.',
    );
    expect(lines).toHaveLength(4);
    expect((await readdir(folder)).sort()).toEqual(['edges.csv', 'nodes.csv']);
  });

  it.each([
    [
      'a missing file',
      ['--nodes', 'none.csv', '--edges', 'edges.csv'],
      'none.csv; check the path.',
    ],
    ['a missing second file', ['--nodes', 'nodes.csv', '--edges', 'none.csv'], 'none.csv; check'],
    ['a folder', ['--nodes', '.', '--edges', 'edges.csv'], '. is a folder; name a file.'],
    ['no folder to write to', [...FILES, '--pairs', 'none/pairs.csv'], 'none/pairs.csv; check'],
  ])('%s is named in one sentence', async (_, args, sentence) => {
    const { status, stdout, stderr } = await command(...args);
    expect([status, stdout]).toEqual([1, '']);
    expect(stderr).toContain(sentence);
    expect(stderr.trimEnd().split('\n')).toHaveLength(1);
  });

  it('a network with more cliques than the limit is refused with the number', async () => {
    const n = 120;
    const edges = Array.from({ length: n }, (_, i) =>
      Array.from({ length: i }, (_, j): [number, number] => [j, i]),
    ).flat();
    await write(networkOf(n, edges));
    const { status, stdout, stderr } = await command(...FILES, '--pairs', 'pairs.csv');
    expect([status, stdout]).toEqual([1, '']);
    expect(stderr).toMatch(/40,?000,?000/);
    expect(stderr.trimEnd().split('\n')).toHaveLength(1);
    expect((await readdir(folder)).sort()).toEqual(['edges.csv', 'nodes.csv']);
  });
});

it('--help says what may be written', async () => {
  const { status, stdout, stderr } = await command('--help');
  expect([status, stderr]).toEqual([0, '']);
  for (const option of ['nodes', 'edges', 'scale', 'max-dimension', 'pairs', 'barcodes']) {
    expect(stdout).toContain(`--${option}`);
  }
});
