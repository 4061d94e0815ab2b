import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { MultiGraph } from 'graphology';
import { parse as parseGexf, write as writeGexf } from 'graphology-gexf';
import { parse as parseGraphml } from 'graphology-graphml';
import { describe, expect, test } from 'vitest';
import { exportPieces } from '../../formats/writers/exportNetwork';
import { seeded } from '../support/graphs';
import { bring, drawn } from './bring';

const FOLDER = join(import.meta.dirname, 'fixtures/graphs');

const edgesOf = (graph: MultiGraph): string[] =>
  graph.mapEdges((_, { weight }, source, target) =>
    [source, target, String(weight ?? '')].join(' '),
  );

/** A graph of up to 12 nodes with names, entries and weights; parallel edges and loops with the rest. */
function grown(seed: number): MultiGraph {
  const source = seeded(seed);
  const graph = new MultiGraph({ type: seed % 2 === 0 ? 'undirected' : 'directed' });
  const n = source.integer(1, 12);
  for (let node = 0; node < n; node++) {
    const label = `“${node}” <b> & ${'é'.repeat(source.integer(0, 3))}`;
    graph.addNode(`n ${node}`, { label, entry: source.integer(0, 80) / 8 });
  }
  for (let edge = source.integer(0, 20); edge > 0; edge--) {
    const [a, b] = [source.integer(0, n - 1), source.integer(0, n - 1)];
    graph.addEdge(`n ${a}`, `n ${b}`, { weight: source.integer(1, 9) / 4 });
  }
  return graph;
}

describe('on well-formed files the readers of graphology find the same', () => {
  test.each(['reedbed.graphml', 'ferry.gexf', 'beacons.gexf', 'offices.gexf'])(
    '%s',
    async (file) => {
      const bytes = readFileSync(join(FOLDER, file));
      const parse = file.endsWith('gexf') ? parseGexf : parseGraphml;
      const graph = parse(MultiGraph, bytes.toString('utf8'));
      const { sources } = await bring({ [file]: new Uint8Array(bytes) });
      const rows = (part: 'nodes' | 'edges') =>
        [...(sources[0]?.[part]?.rows() ?? [])].map(({ cells }) => cells);
      expect(rows('nodes').map(([id]) => id)).toEqual(graph.nodes());
      expect(rows('edges').map(([source, target]) => `${source} ${target}`)).toEqual(
        graph.mapEdges((_, __, source, target) => `${source} ${target}`),
      );
    },
  );

  test('GEXF that graphology writes', async () => {
    for (let seed = 0; seed < 60; seed++) {
      const graph = grown(seed);
      const { sources, issues } = await bring({ 'x.gexf': writeGexf(graph) });
      expect(issues).toEqual([]);
      const { nodes, edges } = sources[0]!;
      const at = nodes!.columns.indexOf('entry');
      expect(
        [...nodes!.rows()].map(({ cells }) => [cells[0], cells[1], Number(cells[at])]),
      ).toEqual(graph.mapNodes((id, { label, entry }) => [id, label as unknown, entry as unknown]));
      expect([...(edges?.rows() ?? [])].map(({ cells }) => cells.slice(0, 3).join(' '))).toEqual(
        edgesOf(graph),
      );
    }
  });

  test('GraphML that is exported', async () => {
    for (let seed = 0; seed < 60; seed++) {
      const brought = await bring({ 'x.gexf': writeGexf(grown(seed)) });
      const text = [...exportPieces('graphml', brought.network!)].join('');
      const graph = parseGraphml(MultiGraph, text);
      expect(graph.nodes()).toEqual(brought.network!.nodes.map(({ id }) => id));
      expect(graph.mapNodes((_, { label }) => label as unknown)).toEqual(
        brought.network!.nodes.map(({ label }) => label),
      );
      expect(
        graph.mapEdges((_, { weight }, source, target) => `${source}-${target}*${String(weight)}`),
      ).toEqual(drawn(brought).edges);
    }
  });
});

test('times, which the GEXF reader of graphology drops, are read', async () => {
  const bytes = readFileSync(join(FOLDER, 'ferry.gexf'));
  const graph = parseGexf(MultiGraph, bytes.toString('utf8'));
  const attributes = graph.mapNodes((_, all) => Object.keys(all)).flat();
  expect(attributes.filter((name) => /start|end|spell/.test(name))).toEqual([]);
  const { network } = await bring({ 'ferry.gexf': new Uint8Array(bytes) });
  expect(network?.nodes.map(({ entryRaw }) => entryRaw)).toEqual([
    '2020-03-01',
    '2020-05-01',
    '2020-12-24',
  ]);
});
