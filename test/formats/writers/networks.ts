import type { NetworkNode, ReadNetwork } from '../../../formats/types';
import type { WrittenNetwork } from '../../../formats/writers/types';
import type { Brought, Files } from '../bring';

/** Texts that formats, spreadsheets or pages could take for something else. */
export const NASTY_LABELS: readonly string[] = [
  '=HYPERLINK("http://example.invalid")',
  "'=HYPERLINK",
  "''=x",
  '+1 more',
  '-1.5',
  "'-1.5",
  '-x',
  '@home',
  '\ttab first',
  '\rreturn first',
  'a "quoted" word',
  "'apostrophe",
  'two\nlines',
  'two\r\nlines, a comma; and more',
  'old\rline end',
  '<img src=x onerror=alert(1)>',
  ']]> &amp; &#65; <![CDATA[',
  'abc\u202edef',
  'zero\u200bwidth',
  'cafe\u0301',
  'café au lait',
  '👩‍🔬 emoji',
  '  leading spaces',
  'trailing space ',
  '\u00a0hard space',
  '\ufeffmark first',
  '\u2028separator',
  'next\u0085line',
  'control\u0001\u001f',
  '__proto__',
  'constructor',
  'toString',
  '#comment',
  '%comment',
  'sep=;',
  'NA',
  'null',
  '?',
  '007',
  '1,5',
  '01/02/2024',
  `e${'\u0301'.repeat(250)}`,
  '{"id": 1}',
  '\\u0041\\',
];

/** Invented networks with entries of every unit, windows, ties, missing entries and weights. */
export const SMALL_NETWORKS: Readonly<Record<string, Files>> = {
  'numbers, ties and weights, some of them missing': {
    'nodes.csv': 'id,label,entry\na,Ash,1\nb,Beech,2.50\nc,Cedar,2.5\nd,Dogwood,-0\ne,Elm,1e16\n',
    'edges.csv': 'source,target,weight\na,b,0.1\nc,b,1e300\nc,d,\nd,e,1e17\n',
  },
  'days with windows and months': {
    'nodes.csv':
      'id,label,entry,earliest,latest\na,Ash,2024-02-01,2024-01-20,2024-02-10\nb,Beech,2023-05,,\nc,Cedar,1 Feb 2024,,2024-03-01\n',
    'edges.csv': 'source,target\na,b\nb,c\n',
  },
  'days with slashes': {
    'nodes.csv': 'id,label,entry\na,Ash,01/02/2024\nb,Beech,03/02/2024\n',
    'edges.csv': 'source,target\na,b\n',
  },
  'seconds, one with a fraction': {
    'nodes.csv':
      'id,label,entry\na,Ash,2024-02-01T09:30\nb,Beech,2024-02-01T09:30:00.125\nc,Cedar,1969-12-31 23:59\n',
    'edges.csv': 'source,target,weight\na,b,2\na,c,-0.5\n',
  },
  'missing entries that are placed last': {
    'nodes.csv': 'id,label,entry\na,Ash,1\nb,Beech,NA\nc,Cedar,\nd,Dogwood,3\n',
    'edges.csv': 'source,target\na,b\nc,d\n',
  },
  'the order of rows': {
    'nodes.csv': 'id,label\nx1,Ash\nx2,Beech\n',
    'edges.csv': 'source,target\nx1,x2\n',
  },
  'the first time of any edge': {
    'edges.csv':
      'source,target,time\na,b,2024-01-03\nb,c,2024-01\na,d,2024-01-05\nd,d,2024-01-06\n',
  },
  'nodes and no edge': { 'nodes.csv': 'id,label,entry\na,Ash,1\nb,Beech,1\n' },
  'one node': { 'nodes.csv': 'id,label,entry\na,Ash,1\n' },
};

export function networkOf({ network, issues, questions }: Brought): ReadNetwork {
  if (!network) throw new Error(`No network: ${JSON.stringify({ issues, questions })}`);
  return network;
}

/** A network of nodes like these, with windows at every third and edges between neighbours. */
export function writtenNetwork(
  given: readonly (Pick<NetworkNode, 'id' | 'label'> & Partial<NetworkNode>)[],
  edgeCount = given.length - 1,
  weights: readonly number[] = [],
): WrittenNetwork {
  const nodes = given.map((node, at): NetworkNode => {
    const entry = node.entry ?? at / 4;
    const window = at % 3 === 1;
    return {
      entryRaw: `about ${entry}`,
      entry,
      earliestRaw: window ? `not before ${entry}` : '',
      earliest: window ? entry : null,
      latestRaw: '',
      latest: at % 3 === 2 ? entry : null,
      ...node,
    };
  });
  const edges = nearPairs(nodes.length, edgeCount);
  return {
    nodes,
    edges: Uint32Array.from(edges.flat()),
    weights: Float64Array.from(edges, (_, at) => weights[at] ?? (at % 5 === 4 ? NaN : at / 10)),
    entryUnit: 'number',
  };
}

/** The first so many pairs of rows, nearest first, in ascending order. */
function nearPairs(nodes: number, most: number): [number, number][] {
  const pairs: [number, number][] = [];
  for (let gap = 1; gap < nodes && pairs.length < most; gap++) {
    for (let low = 0; low + gap < nodes && pairs.length < most; low++) pairs.push([low, low + gap]);
  }
  return pairs.sort(([a, b], [c, d]) => a - c || b - d);
}
