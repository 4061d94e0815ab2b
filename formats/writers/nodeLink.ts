import type { NetworkNode } from '../types';
import { VALUE_COLUMNS } from '../understanding/choices';
import { numberText } from './cells';
import { edgesOf, type WrittenEdge } from './networkTables';
import type { WrittenNetwork } from './types';

/** JSON node-link, an element a line: `nodes` with raw texts and values, `links` by id. */
export function* nodeLinkPieces(network: WrittenNetwork): Generator<string> {
  const { nodes, entryUnit, weights } = network;
  yield '{"directed": false, "multigraph": false,\n"nodes": [';
  yield* listed(nodes, (node) => nodeMembers(node, entryUnit));
  yield '\n],\n"links": [';
  yield* listed(edgesOf(network), (edge) => edgeMembers(edge, { weighted: weights !== null }));
  yield '\n]}\n';
}

/** Name and value, the value being JSON already. */
type Member = readonly [name: string, json: string];

function* listed<Item>(
  items: Iterable<Item>,
  members: (item: Item) => readonly Member[],
): Generator<string> {
  let mark = '\n';
  for (const item of items) {
    const inside = members(item).map(([name, json]) => `${JSON.stringify(name)}: ${json}`);
    yield `${mark}{${inside.join(', ')}}`;
    mark = ',\n';
  }
}

function nodeMembers(node: NetworkNode, unit: string): Member[] {
  const { id, label, entryRaw, entry } = node;
  return [
    ['id', JSON.stringify(id)],
    ['label', JSON.stringify(label)],
    ['entry', JSON.stringify(entryRaw)],
    ...windowMembers('earliest', node.earliestRaw, node.earliest),
    ...windowMembers('latest', node.latestRaw, node.latest),
    [VALUE_COLUMNS.entry, numberText(entry)],
    [VALUE_COLUMNS.unit, JSON.stringify(unit)],
  ];
}

/** An end of the window, left out where there is none. */
const windowMembers = (
  name: 'earliest' | 'latest',
  raw: string,
  value: number | null,
): Member[] => [
  ...(raw === '' ? [] : [[name, JSON.stringify(raw)] as const]),
  ...(value === null ? [] : [[VALUE_COLUMNS[name], numberText(value)] as const]),
];

const edgeMembers = (
  { source, target, weight }: WrittenEdge,
  { weighted }: { weighted: boolean },
): Member[] => [
  ['source', JSON.stringify(source)],
  ['target', JSON.stringify(target)],
  ...(weighted ? [['weight', weight === null ? 'null' : numberText(weight)] as const] : []),
];
