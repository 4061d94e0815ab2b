import { Readable } from 'node:stream';
import { describe, expect, it } from 'vitest';
import { demoNetworks } from '../../db/seed/index';
import { saltmere } from '../../db/seed/saltmere';
import type { DemoNetwork } from '../../db/seed/source';
import { ternBank } from '../../db/seed/ternBank';
import { workedCases } from '../../db/seed/workedCases';
import { contentHash } from '../../formats/canonical';
import { readNetwork } from '../../formats/nodesAndEdges';
import type { ReadNetwork } from '../../formats/types';
import { computeRows, prepare, recordedBarcode } from '../../jobs/engine/index';
import { valuesOn } from '../../jobs/scales';
import { UPLOAD_LIMITS } from '../../server/contract/datasets';

const LIMITS = { simplices: 1e7, bytes: 2 ** 30 };
const CONTROL = { shouldStop: () => false, onProgress: () => undefined };

async function read({ nodesCsv, edgesCsv }: DemoNetwork): Promise<ReadNetwork> {
  const outcome = await readNetwork(
    { name: 'nodes.csv', bytes: Readable.from([Buffer.from(nodesCsv)]) },
    { name: 'edges.csv', bytes: Readable.from([Buffer.from(edgesCsv)]) },
    UPLOAD_LIMITS,
  );
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.issues));
  return outcome;
}

async function computed(demo: DemoNetwork, scale: 'entry' | 'rank') {
  const { nodes, edges } = await read(demo);
  const values = valuesOn(
    scale,
    Float64Array.from(nodes, ({ entry }) => entry),
  );
  const nodeCount = values.length;
  const prepared = prepare({ nodeCount, edges, values }, 3, LIMITS, CONTROL);
  const rows = Uint32Array.from({ length: Math.max(0, nodeCount - 1) }, (_, p) => p);
  const { distances, pairCount } = computeRows(prepared, rows, CONTROL);
  const sorted = values.toSorted();
  const pairs: { q: number; p: number; bound: number; largest: number }[] = [];
  for (let p = 0; p < nodeCount; p++) {
    for (let q = p + 1; q < nodeCount; q++) {
      const i = pairs.length;
      const largest = Math.max(...[1, 2, 3].map((k) => distances[k * pairCount + i] ?? NaN));
      pairs.push({ p, q, bound: (sorted[q] ?? 0) - (sorted[p] ?? 0), largest });
    }
  }
  const bars = recordedBarcode(prepared).map(({ births, deaths }) =>
    Array.from(births, (birth, k) => [birth, deaths[k] ?? NaN] as const),
  );
  return { bars, pairs, nodeCount };
}

const share = <T>(list: readonly T[], holds: (one: T) => boolean): number =>
  list.filter(holds).length / list.length;

describe('the demo networks', () => {
  it('are files that an upload would accept, labelled as invented or as a worked case', async () => {
    for (const demo of demoNetworks()) {
      const { report } = await read(demo);
      expect([report.selfLoops, report.duplicateEdges, report.reversedEdges]).toEqual([0, 0, 0]);
      expect(
        demo.description.startsWith(demo.invented ? 'Invented data.' : 'Worked case from'),
      ).toBe(true);
    }
    expect(demoNetworks().map(({ invented }) => invented)).toEqual([
      false,
      false,
      false,
      true,
      true,
    ]);
  });

  it('are the same on every machine', async () => {
    const hashes = await Promise.all(
      [saltmere(), ternBank()].map(async (demo) => contentHash(await read(demo)).slice(0, 16)),
    );
    expect(hashes).toEqual(['273248beb08aa7b8', '2706ba446e5747fb']);
  });

  it('Saltmere: 46 species with windows, bars in dimensions 1 and 2, 30 to 60 % of pairs swap-safe', async () => {
    const { nodes, report } = await read(saltmere());
    expect([nodes.length, report.components]).toEqual([46, 1]);
    expect(new Set(nodes.map(({ label }) => label)).size).toBe(46);
    expect(nodes.every(({ earliest, latest }) => earliest !== null && latest !== null)).toBe(true);
    const { bars, pairs, nodeCount } = await computed(saltmere(), 'rank');
    const lasting = (k: number) => bars[k]?.filter(([birth, death]) => death - birth >= 10) ?? [];
    expect(lasting(1).length).toBeGreaterThanOrEqual(5);
    expect(lasting(2).length).toBeGreaterThanOrEqual(3);
    const safe = share(pairs, ({ largest }) => largest === 0);
    expect(safe).toBeGreaterThan(0.3);
    expect(safe).toBeLessThan(0.6);
    const earlyAndNear = pairs.filter(({ p, q }) => q - p <= 4 && p < nodeCount / 2);
    expect(share(earlyAndNear, ({ largest }) => largest === 0)).toBeGreaterThan(0.6);
    expect(share(pairs, ({ bound, largest }) => largest > bound / 2)).toBeGreaterThan(0.1);
  });

  it('Tern Bank: 60 stations with dates, lasting bars in dimension 1, 30 to 60 % of pairs swap-safe', async () => {
    const { nodes, entryUnit, report } = await read(ternBank());
    expect([nodes.length, entryUnit, report.components]).toEqual([60, 'days', 1]);
    const { bars, pairs } = await computed(ternBank(), 'rank');
    expect(bars[1]?.filter(([birth, death]) => death - birth >= 5).length).toBeGreaterThanOrEqual(
      4,
    );
    const safe = share(pairs, ({ largest }) => largest === 0);
    expect(safe).toBeGreaterThan(0.3);
    expect(safe).toBeLessThan(0.6);
  });

  // Sources: the descriptions of the cases.
  it('the worked cases have the barcodes that their descriptions name', async () => {
    const [four, octahedron, ring] = await Promise.all(
      workedCases().map(async (demo) => (await computed(demo, 'entry')).bars),
    );
    expect(four).toEqual([[[0, Infinity]], [], [], []]);
    expect(octahedron).toEqual([[[0, Infinity]], [], [[5, Infinity]], []]);
    expect(ring).toEqual([
      [
        [0, Infinity],
        [1, 4],
        [2, 5],
        [3, 6],
      ],
      [[7, Infinity]],
      [],
      [],
    ]);
  });

  it('no swap of the four nodes, nor of nodes 2 to 5 of the octahedron, moves a bar', async () => {
    const [four, octahedron] = workedCases();
    if (!four || !octahedron) throw new Error('A worked case is missing.');
    expect((await computed(four, 'entry')).pairs.map(({ largest }) => largest)).toEqual(
      Array.from({ length: 6 }, () => 0),
    );
    const among = (await computed(octahedron, 'entry')).pairs.filter(({ p }) => p >= 2);
    expect(among.map(({ largest }) => largest)).toEqual(Array.from({ length: 6 }, () => 0));
  });
});
