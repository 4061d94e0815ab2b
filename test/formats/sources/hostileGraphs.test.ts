import { describe, expect, test } from 'vitest';
import { readSource } from '../../../formats/sources/readSource';
import type { RawSource } from '../../../formats/sources/types';
import { LIMITS } from '../bring';

const read = (text: string, name: string): Promise<RawSource> =>
  readSource({ name, bytes: new TextEncoder().encode(text) }, {}, LIMITS);

const graphml = (inside: string, before = ''): string =>
  `<?xml version="1.0"?>\n${before}<graphml>\n<graph edgedefault="undirected">\n${inside}\n</graph>\n</graphml>\n`;
const gexf = (inside: string, before = ''): string =>
  `<?xml version="1.0"?>\n${before}<gexf version="1.3">\n<graph>\n${inside}\n</graph>\n</gexf>\n`;

const XML: Readonly<Record<string, (inside: string, before?: string) => string>> = {
  graphml,
  gexf,
};

const BOMB = `<!DOCTYPE g [
<!ENTITY a "aaaaaaaaaa">
<!ENTITY b "&a;&a;&a;&a;&a;&a;&a;&a;&a;&a;">
<!ENTITY c "&b;&b;&b;&b;&b;&b;&b;&b;&b;&b;">
]>
`;
const NODE = '<nodes><node id="a"/></nodes>';

/** What is hostile, around or among the elements of a graph; the line that is named; what is said. */
const HOSTILE_XML: readonly [string, { inside?: string; before?: string }, number, RegExp][] = [
  ['entities that expand', { before: BOMB }, 2, /DOCTYPE/],
  ['an entity outside the file', { before: '<!DOCTYPE g SYSTEM "file:///x">\n' }, 2, /DOCTYPE/],
  [
    'a parameter entity',
    { before: '<!DOCTYPE g [ <!ENTITY % p SYSTEM "http://example.invalid/x"> %p; ]>\n' },
    2,
    /DOCTYPE/,
  ],
  ['an entity that nothing defines', { inside: '<node id="&x;"/>' }, 4, /entity/],
  ['a reference to no character', { inside: '<node id="&#0;"/>' }, 4, /character reference/],
  ['a reference past all characters', { inside: '<node id="&#x110000;"/>' }, 4, /character ref/],
  [
    'a million references in one value',
    { inside: `<node id="${'&#65;'.repeat(1_000_001)}"/>` },
    4,
    /longer than 1000000/,
  ],
  [
    'a million references in one text',
    { inside: `<data key="k">${'&#65;'.repeat(1_000_001)}</data>` },
    4,
    /longer than 1000000/,
  ],
  ['200,000 levels', { inside: '<g>'.repeat(200_000) }, 4, /nested more than 100 deep/],
  [
    '100,000 attributes of one element',
    { inside: `<node ${Array.from({ length: 100_000 }, (_, k) => `a${k}="1"`).join(' ')}/>` },
    4,
    /more than 256 attributes/,
  ],
  ['an attribute twice', { inside: '<node id="a"\n id="b"/>' }, 5, /same attribute twice/],
  ['a tag that is never closed', { inside: '<nodes>\n<node id="a">\n' }, 5, /never closed/],
  ['a lone ampersand', { inside: '<node id="a & b"/>' }, 4, /&amp;/],
];

describe.each(Object.entries(XML))('%s', (ending, wrapped) => {
  test.each(HOSTILE_XML)('with %s is refused by line', async (_, parts, line, says) => {
    const source = await read(wrapped(parts.inside ?? NODE, parts.before), `x.${ending}`);
    expect([source.nodes, source.edges]).toEqual([null, null]);
    const last = source.issues.at(-1);
    expect(last?.message).toMatch(says);
    expect(last?.line).toBe(line);
  });

  test('a million references within the length of a text are read', async () => {
    const many = Array.from(
      { length: 5_000 },
      (_, at) => `<node id="${'&#66;'.repeat(200)}${at}"/>`,
    ).join('\n');
    const source = await read(
      wrapped(ending === 'gexf' ? `<nodes>${many}</nodes>` : many),
      `x.${ending}`,
    );
    expect(source.issues).toEqual([]);
    expect(source.nodes?.rowCount).toBe(5_000);
    expect(source.nodes?.preview[0]?.cells[0]).toBe(`${'B'.repeat(200)}0`);
  });
});

const HOSTILE_OTHERS: readonly [string, string, string, number, RegExp][] = [
  ['JSON, 200,000 lists in each other', 'x.json', `{"nodes": ${'['.repeat(200_000)}`, 1, /./],
  [
    'JSON, 200,000 objects in each other',
    'x.json',
    `{"nodes": [{"id": 1, "a": ${'{"a":'.repeat(200_000)}`,
    1,
    /nested more than 100 deep/,
  ],
  [
    'JSON with a text of more than a megabyte',
    'x.json',
    `{"nodes": [\n{"id": "${'a'.repeat(1_000_001)}"}]}`,
    2,
    /longer than 1000000/,
  ],
  [
    'JSON with a million escapes in one text',
    'x.json',
    `{"nodes": [\n{"id": "${'\\u0041'.repeat(1_000_001)}"}]}`,
    2,
    /longer than 1000000/,
  ],
  ['JSON with a key twice', 'x.json', '{"nodes": [\n{"id": "a",\n"id": "b"}]}', 3, /stands twice/],
  ['JSON with text behind it', 'x.json', '{"nodes": [{"id": "a"}]}\n{}', 2, /More follows/],
  [
    'JSON with half of a character',
    'x.json',
    '{"nodes": [\n{"id": "\\ud800"}]}',
    2,
    /lone surrogate/,
  ],
  ['JSON with NUL', 'x.json', '{"nodes": [\n{"id": "\\u0000"}]}', 2, /NUL/],
  ['JSON that is cut off', 'x.json', '{"nodes": [\n{"id": "a"', 2, /./],
  [
    'GML, 200,000 lists in each other',
    'x.gml',
    `graph [\n${'a [ '.repeat(200_000)}`,
    2,
    /nested more than 100 deep/,
  ],
  [
    'GML with a text of more than a megabyte',
    'x.gml',
    `graph [\nnode [ id "${'a'.repeat(1_000_001)}" ] ]`,
    2,
    /longer than 1000000/,
  ],
  ['GML with a list that is never closed', 'x.gml', 'graph [\nnode [ id 1\n', 2, /never closed/],
  [
    'GML with a text that is never closed',
    'x.gml',
    'graph [\nnode [ id 1 label "a ]\n]',
    2,
    /never closed/,
  ],
  [
    'Pajek with more vertices than can be',
    'x.net',
    '*Vertices 99999999999\n',
    1,
    /99999999999 vertices; at most 5000/,
  ],
  [
    'Pajek with one line of more than a megabyte',
    'x.net',
    `*Vertices 2\n*Edges\n${'1 2 '.repeat(250_001)}`,
    3,
    /longer than 1000000/,
  ],
  ['Pajek with a quote that is never closed', 'x.net', '*Vertices 1\n1 "a\n', 2, /not closed/],
  ['Pajek with a vertex 0', 'x.net', '*Vertices 1\n*Edges\n0 1\n', 3, /from 1 to 1/],
];

test.each(HOSTILE_OTHERS)('%s is refused by line', async (_, name, text, line, says) => {
  const { issues } = await read(text, name);
  expect(issues.at(-1)?.message).toMatch(says);
  expect(issues.at(-1)?.line).toBe(line);
});

describe('a wide file is read within its limits', () => {
  test.each([
    [
      'x.json',
      `{"nodes": [${'{"id": 1, "__proto__": 2, "constructor": 3},'}{"id": 2}], "links": []}`,
    ],
    ['x.gml', 'graph [ node [ id 1 __proto__ 2 constructor 3 ] node [ id 2 ] ]'],
  ])('%s: keys like __proto__ are data', async (name, text) => {
    const { nodes, issues } = await read(text, name);
    expect(issues).toEqual([]);
    expect(nodes?.columns).toEqual(['id', '__proto__', 'constructor']);
    expect(nodes?.preview.map(({ cells }) => cells)).toEqual([
      ['1', '2', '3'],
      ['2', '', ''],
    ]);
  });

  test('more attributes than columns are read are refused', async () => {
    const wide = Array.from({ length: 10_001 }, (_, k) => `"a${k}": 1`).join(',');
    const { issues } = await read(`{"nodes": [\n{"id": 1, ${wide}}]}`, 'x.json');
    expect(issues.map(({ line, message }) => `${line}:${message}`)).toEqual([
      expect.stringMatching(/^2:.*more than 10000 attributes/),
    ]);
  });
});
