import type { NetworkNode } from '../types';
import { VALUE_COLUMNS } from '../understanding/choices';
import { numberText } from './cells';
import { edgesOf } from './networkTables';
import type { WrittenNetwork } from './types';
import { xmlText, xmlVersionFor } from './xmlText';

/**
 * GraphML (Brandes, Eiglsperger, Herman, Himsolt, Marshall 2002), an element a line: raw texts as
 * strings, values as doubles, the unit as the default of its key.
 * @throws UnwritableText at once, not while it is read
 */
export function graphmlPieces(network: WrittenNetwork): Iterable<string> {
  return lines(network, xmlVersionFor(textsOf(network)));
}

function* textsOf({ nodes }: WrittenNetwork): Generator<string> {
  for (const { id, label, entryRaw, earliestRaw, latestRaw } of nodes)
    yield* [id, label, entryRaw, earliestRaw, latestRaw];
}

function* lines(network: WrittenNetwork, version: string): Generator<string> {
  yield `<?xml version="${version}" encoding="UTF-8"?>\n`;
  yield '<graphml xmlns="http://graphml.graphdrawing.org/xmlns">\n';
  yield* keys(network);
  yield '  <graph edgedefault="undirected">\n';
  for (const node of network.nodes) yield nodeElement(node);
  for (const { source, target, weight } of edgesOf(network)) {
    const ends = `source="${xmlText(source)}" target="${xmlText(target)}"`;
    yield weight === null
      ? `    <edge ${ends}/>\n`
      : `    <edge ${ends}>${value('weight', weight)}</edge>\n`;
  }
  yield '  </graph>\n</graphml>\n';
}

function* keys({ entryUnit, weights }: WrittenNetwork): Generator<string> {
  for (const name of ['label', 'entry', 'earliest', 'latest'])
    yield `  <key ${declared(name, 'node', 'string')}/>\n`;
  for (const name of ['entry', 'earliest', 'latest'] as const)
    yield `  <key ${declared(VALUE_COLUMNS[name], 'node', 'double')}/>\n`;
  const unit = declared(VALUE_COLUMNS.unit, 'node', 'string');
  yield `  <key ${unit}><default>${entryUnit}</default></key>\n`;
  if (weights) yield `  <key ${declared('weight', 'edge', 'double')}/>\n`;
}

const declared = (name: string, of: string, type: string): string =>
  `id="${name}" for="${of}" attr.name="${name}" attr.type="${type}"`;

/** The raw entry is there even where it is empty, so that its column is. */
function nodeElement(node: NetworkNode): string {
  const { id, label, entryRaw, entry, earliestRaw, earliest, latestRaw, latest } = node;
  const data = [
    raw('label', label),
    raw('entry', entryRaw),
    earliestRaw === '' ? '' : raw('earliest', earliestRaw),
    latestRaw === '' ? '' : raw('latest', latestRaw),
    value(VALUE_COLUMNS.entry, entry),
    earliest === null ? '' : value(VALUE_COLUMNS.earliest, earliest),
    latest === null ? '' : value(VALUE_COLUMNS.latest, latest),
  ];
  return `    <node id="${xmlText(id)}">${data.join('')}</node>\n`;
}

/** A text; where spaces stand at its ends, they are told to count. */
const raw = (key: string, text: string): string =>
  `<data key="${key}"${text === text.trim() ? '' : ' xml:space="preserve"'}>${xmlText(text)}</data>`;

const value = (key: string, number: number): string =>
  `<data key="${key}">${numberText(number)}</data>`;
