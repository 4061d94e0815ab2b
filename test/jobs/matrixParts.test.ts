import { spawn } from 'node:child_process';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { build } from 'esbuild';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { constantProbability, seeded } from '../support/graphs';

const NODES = 16;
const root = join(import.meta.dirname, '..', '..');
const built = join(root, 'node_modules', '.cache', `heddle-matrix-parts-${process.pid}`);
const folder = mkdtempSync(join(tmpdir(), 'heddle-matrix-parts-'));
const windows = drawnWindows();

/** Entry, earliest and latest of every node; a third of them without a window. */
function drawnWindows() {
  const source = seeded(12);
  return Array.from({ length: NODES }, (_, row) => {
    const open = source.real() < 0.3;
    const [before, after] = [source.integer(0, 3), source.integer(0, 3)];
    return { entry: row, earliest: open ? null : row - before, latest: open ? null : row + after };
  });
}

function command(...args: string[]): Promise<{ status: number | null; out: string; err: string }> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [join(built, 'matrix.mjs'), ...args], { cwd: folder });
    let [out, err] = ['', ''];
    child.stdout.on('data', (chunk: Buffer) => (out += chunk.toString()));
    child.stderr.on('data', (chunk: Buffer) => (err += chunk.toString()));
    child.on('error', reject);
    child.on('close', (status) => resolve({ status, out, err }));
  });
}

const FILES = ['--nodes', 'nodes.csv', '--edges', 'edges.csv'];

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
  const nodes = windows.map(
    ({ entry, earliest, latest }, row) => `n${row},N,${entry},${earliest ?? ''},${latest ?? ''}`,
  );
  const { edges } = constantProbability(NODES, 0.5, 6);
  const lines = Array.from({ length: edges.length / 2 }, (_, e) => [
    edges[2 * e],
    edges[2 * e + 1],
  ]).map(([a, b]) => `n${a},n${b}`);
  writeFileSync(
    join(folder, 'nodes.csv'),
    ['id,label,entry,earliest,latest', ...nodes, ''].join('\n'),
  );
  writeFileSync(join(folder, 'edges.csv'), ['source,target', ...lines, ''].join('\n'));
});
afterAll(() => {
  rmSync(built, { recursive: true, force: true });
  rmSync(folder, { recursive: true, force: true });
});

describe('the matrix command on a part of the pairs', () => {
  const overlap = (p: number, q: number): boolean => {
    const [a, b] = [windows[p], windows[q]];
    if (!a || !b) return false;
    return (b.earliest ?? b.entry) <= (a.latest ?? a.entry);
  };
  it.each<[string, string[], (p: number, q: number) => boolean]>([
    ['--within 3', ['--within', '3'], (p, q) => q - p <= 3],
    ['--within 900', ['--within', '900'], () => true],
    ['--overlapping', ['--overlapping'], overlap],
    ['--overlapping on ranks', ['--overlapping', '--scale', 'rank'], overlap],
  ])('%s writes those rows of the whole file', async (_, args, holds) => {
    const scale = args.includes('rank') ? ['--scale', 'rank'] : [];
    const whole = (await command(...FILES, ...scale)).out.split('\n');
    const [header = '', ...lines] = whole;
    let line = 0;
    const kept = [header];
    for (let p = 0; p < NODES; p++)
      for (let q = p + 1; q < NODES; q++, line++) if (holds(p, q)) kept.push(lines[line] ?? '');
    const part = await command(...FILES, ...args);
    expect(part).toMatchObject({ status: 0, err: '' });
    expect(part.out).toBe([...kept, ''].join('\n'));
  });

  it.each([
    ['0', '--within is "0"; write a whole number'],
    ['1.5', '--within is "1.5"'],
    ['x', '--within is "x"'],
  ])('--within %s is a wrong call', async (positions, sentence) => {
    const { status, err } = await command(...FILES, '--within', positions);
    expect([status, err.startsWith(sentence)]).toEqual([2, true]);
  });

  it('two parts at once are a wrong call', async () => {
    const { status, err } = await command(...FILES, '--within', '2', '--overlapping');
    expect([status, err]).toEqual([2, '--within and --overlapping are two parts; write one.\n']);
  });

  it('a star with 100,000 leaves is answered with the number that broke the limit', async () => {
    const leaves = 100_000;
    const names = Array.from({ length: leaves + 1 }, (_, row) => `s${row}`);
    writeFileSync(
      join(folder, 'star-nodes.csv'),
      ['id,label,entry', ...names.map((name, row) => `${name},,${row}`), ''].join('\n'),
    );
    writeFileSync(
      join(folder, 'star-edges.csv'),
      ['source,target', ...names.slice(1).map((name) => `s0,${name}`), ''].join('\n'),
    );
    const star = ['--nodes', 'star-nodes.csv', '--edges', 'star-edges.csv'];
    const { status, out, err } = await command(...star, '--within', '1');
    expect([status, out]).toEqual([1, '']);
    expect(err.split('\n')[0]).toMatch(/100001 nodes; at most 20000 can be stored/);
    expect(err).not.toMatch(/fault of Heddle/);
  }, 30_000);
});
