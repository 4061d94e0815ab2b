import { DRAWN_EDGES, type ImportGrowth } from '#contract/imports';
import type { ReadNetwork } from '../../formats/types';
import { clipped } from './preview';

/** Characters of a label in the drawing. */
const LABEL = 100;

/** The network in the order of arrival, for the drawing of its growth. */
export function growthOf({
  nodes,
  edges,
  entryUnit,
}: Pick<ReadNetwork, 'nodes' | 'edges' | 'entryUnit'>): ImportGrowth {
  const arrived = nodes
    .map((node, row) => ({ node, row }))
    .sort((a, b) => a.node.entry - b.node.entry || a.row - b.row);
  const positionOf = new Uint32Array(nodes.length);
  for (const [position, { row }] of arrived.entries()) positionOf[row] = position;
  const drawn: [number, number][] = [];
  const draws = edges.length / 2 <= DRAWN_EDGES;
  const edgesBy = new Array<number>(nodes.length).fill(0);
  for (let at = 0; at < edges.length; at += 2) {
    const p = positionOf[edges[at] ?? 0] ?? 0;
    const q = positionOf[edges[at + 1] ?? 0] ?? 0;
    const [first, last] = p < q ? [p, q] : [q, p];
    edgesBy[last] = (edgesBy[last] ?? 0) + 1;
    if (draws) drawn.push([first, last]);
  }
  for (let at = 1; at < edgesBy.length; at++) {
    edgesBy[at] = (edgesBy[at] ?? 0) + (edgesBy[at - 1] ?? 0);
  }
  return {
    entryUnit,
    entries: arrived.map(({ node }) => node.entry),
    labels: arrived.map(({ node }) => clipped(node.label, LABEL)),
    earliest: arrived.map(({ node }) => node.earliest),
    latest: arrived.map(({ node }) => node.latest),
    edgesBy,
    edges: draws ? drawn : null,
  };
}
