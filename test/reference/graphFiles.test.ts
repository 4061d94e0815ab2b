import { describe, expect, test } from 'vitest';
import { bring } from '../formats/bring';
import { seeded } from '../support/graphs';
import { networkxFiles, type GivenGraph } from './programs';

/** Parts of names; all of them can stand in every format. */
const LETTERS = ['a', 'B', '7', 'é', 'ß', '河', '🦉', '-', '_', '.', ' x'];
/** Parts that Pajek as networkx writes it cannot hold. */
const MARKS = ['"', '&', '<b>', "'", '&amp;', ';', '=', '\u202e', 'e\u0301'];

const GRAPHS = Array.from({ length: 40 }, (_, seed) => given(seed));

function given(seed: number): GivenGraph {
  const source = seeded(seed);
  const letters = seed % 2 === 0 ? LETTERS : [...LETTERS, ...MARKS];
  const pick = <T>(from: readonly T[]): T => from[source.integer(0, from.length - 1)]!;
  const word = () => Array.from({ length: source.integer(1, 4) }, () => pick(letters)).join('');
  const n = source.integer(1, 12);
  const names = Array.from({ length: n }, (_, at) => `${word()}#${at}`);
  // Whole and broken numbers: networkx declares one attribute for each kind.
  const nodes = names.map((name) => {
    const entry = source.integer(0, 3) === 0 ? source.integer(0, 9) : source.integer(0, 99) / 8;
    return [name, entry, word()] as const;
  });
  const edges = names.flatMap((later, at) =>
    names
      .slice(0, at)
      .filter(() => source.integer(0, 2) === 0)
      .map((earlier) => [earlier, later, source.integer(1, 40) / 16] as const),
  );
  return { directed: seed % 3 === 0, nodes, edges };
}

const FILES = networkxFiles(GRAPHS);

describe('graphs that networkx writes are read as they are', () => {
  test.each([
    ['graphml', 'id'],
    ['gexf', 'label'],
    ['gml', 'label'],
    ['json', 'id'],
  ] as const)('%s', async (ending, named) => {
    for (const [at, graph] of GRAPHS.entries()) {
      const brought = await bring({ [`x.${ending}`]: FILES[at]![ending] });
      expect(brought.issues).toEqual([]);
      expect(brought.network!.nodes.map((node) => [node[named], node.entry])).toEqual(
        graph.nodes.map(([name, entry]) => [name, entry]),
      );
      // Spaces around data are layout to GraphML, unless xml:space says otherwise.
      const kept = (kind: string) => (ending === 'graphml' ? kind.trim() : kind);
      expect(kindsOf(brought)).toEqual(graph.nodes.map(([, , kind]) => kept(kind)));
      expect(edgesOf(brought, named)).toEqual(sorted(graph));
      expect(brought.found.directed).toBe(graph.directed && graph.edges.length > 0);
    }
  });

  test('net', async () => {
    let read = 0;
    for (const [at, graph] of GRAPHS.entries()) {
      if (at % 2 === 1) continue;
      const brought = await bring({ 'x.net': FILES[at]!.net });
      expect(brought.issues).toEqual([]);
      expect(brought.network!.nodes.map(({ label }) => label)).toEqual(
        graph.nodes.map(([name]) => name),
      );
      expect(edgesOf(brought, 'label')).toEqual(sorted(graph));
      read++;
    }
    expect(read).toBe(20);
  });
});

type Brought = Awaited<ReturnType<typeof bring>>;

function kindsOf({ sources }: Brought): string[] {
  const table = sources[0]!.nodes!;
  const at = table.columns.indexOf('kind');
  return [...table.rows()].map(({ cells }) => cells[at]!);
}

function edgesOf({ network }: Brought, named: 'id' | 'label'): string[] {
  const { nodes, edges, weights } = network!;
  return Array.from({ length: edges.length / 2 }, (_, e) => {
    const ends = [nodes[edges[2 * e]!]![named], nodes[edges[2 * e + 1]!]![named]];
    return JSON.stringify([...ends, weights![e]]);
  }).sort();
}

const sorted = ({ edges }: GivenGraph): string[] =>
  edges.map((edge) => JSON.stringify(edge)).sort();
