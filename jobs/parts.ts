import type { RunPart, StoredNode } from '../db/repositories/runParts';
import { arrivalOrder } from './engine/index';
import type { Part } from './engine/types';

/** Whether a part can only be told from the nodes of its revision. */
export const needsNodes = ({ kind }: RunPart): boolean =>
  kind === 'overlapping' || kind === 'chosen';

/**
 * A part as the engine knows it: by arrival position, which is the same on every scale. A node
 * without `earliest` or `latest` has its entry there.
 *
 * @param nodes in row order; may be empty where `needsNodes` says no
 */
export function enginePart(part: RunPart, nodes: readonly StoredNode[]): Part {
  if (part.kind === 'whole' || part.kind === 'within') return part;
  const order = arrivalOrder(Float64Array.from(nodes, ({ entry }) => entry));
  if (part.kind === 'overlapping') {
    const byPosition = (valueOf: (node: StoredNode) => number): Float64Array =>
      Float64Array.from(order, (row) => {
        const node = nodes[row];
        return node ? valueOf(node) : NaN;
      });
    return {
      kind: 'overlapping',
      starts: byPosition(({ entry, earliest }) => earliest ?? entry),
      ends: byPosition(({ entry, latest }) => latest ?? entry),
    };
  }
  const positions = new Map(Array.from(order, (row, position) => [row, position]));
  // A row that does not exist has a position that does not exist: the engine says so.
  const positionOf = (row: number): number => positions.get(row) ?? nodes.length;
  return {
    kind: 'chosen',
    windows: part.windows,
    nodes: part.nodes.map(positionOf),
    pairs: part.pairs.map(([a, b]) => [positionOf(a), positionOf(b)] as const),
  };
}
