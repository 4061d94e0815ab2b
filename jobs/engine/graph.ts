import { EngineInputError, type Network } from './types';

/** Highest dimension of the barcode. */
export const MAX_DIMENSION = 3;

/**
 * The nodes in an order, and for every place in it the earlier neighbours, ascending:
 * `earlier[starts[i] .. starts[i + 1])`. Length of `earlier`: m.
 */
export interface OrderedGraph {
  readonly nodeCount: number;
  readonly starts: Uint32Array;
  readonly earlier: Uint32Array;
  /** f of the node at each place, -0 as 0. Length n. */
  readonly values: Float64Array;
}

/**
 * Checks everything that the engine relies on later.
 * @throws EngineInputError that names the first offending row or edge.
 */
export function validateNetwork(network: Network, maxDimension: number): void {
  const { nodeCount, edges, values } = network;
  if (!Number.isInteger(maxDimension) || maxDimension < 0 || maxDimension > MAX_DIMENSION) {
    throw new EngineInputError(
      `The highest dimension must be a whole number from 0 to ${MAX_DIMENSION}, not ${maxDimension}.`,
    );
  }
  if (!Number.isInteger(nodeCount) || nodeCount < 0) {
    throw new EngineInputError(`The number of nodes must be a whole number, not ${nodeCount}.`);
  }
  validateValues(values, nodeCount);
  validateEdges(edges, nodeCount);
}

function validateValues(values: Float64Array, nodeCount: number): void {
  if (values.length !== nodeCount) {
    throw new EngineInputError(
      `Every node needs one value: there are ${nodeCount} nodes and ${values.length} values.`,
    );
  }
  let [lowest, highest] = [0, 0];
  values.forEach((value, row) => {
    if (!Number.isFinite(value)) {
      throw new EngineInputError(`The value of node row ${row} is ${value}, not a finite number.`);
    }
    lowest = row === 0 ? value : Math.min(lowest, value);
    highest = row === 0 ? value : Math.max(highest, value);
  });
  if (!Number.isFinite(highest - lowest)) {
    throw new EngineInputError(
      `The values span from ${lowest} to ${highest}: too far apart to subtract.`,
    );
  }
}

function validateEdges(edges: Uint32Array, nodeCount: number): void {
  if (edges.length % 2 !== 0) {
    throw new EngineInputError(
      `Edges are pairs of node rows, but ${edges.length} rows were given.`,
    );
  }
  for (let e = 0; e < edges.length; e += 2) {
    const [u, v] = [edges[e]!, edges[e + 1]!];
    if (u >= nodeCount || v >= nodeCount) {
      throw new EngineInputError(
        `Edge ${e / 2} joins rows ${u} and ${v}, but there are ${nodeCount} nodes.`,
      );
    }
    if (u === v) throw new EngineInputError(`Edge ${e / 2} joins node row ${u} to itself.`);
  }
  const graph = orderGraph(
    { nodeCount, edges, values: new Float64Array(nodeCount) },
    rowsOf(nodeCount),
  );
  for (let i = 0; i < nodeCount; i++) {
    for (let k = graph.starts[i]! + 1; k < graph.starts[i + 1]!; k++) {
      if (graph.earlier[k] === graph.earlier[k - 1]) {
        throw new EngineInputError(
          `The edge between node rows ${graph.earlier[k]!} and ${i} is given more than once.`,
        );
      }
    }
  }
}

function rowsOf(nodeCount: number): Uint32Array {
  return Uint32Array.from({ length: nodeCount }, (_, row) => row);
}

/**
 * Node row at each arrival position: ascending by value, ties by row; -0 counts as 0.
 * @param values f of every node row, finite, length n
 */
export function arrivalOrder(values: Float64Array): Uint32Array {
  // -0 - 0 is -0, which is falsy like 0: the tie goes to the row.
  return rowsOf(values.length).sort((u, v) => values[u]! - values[v]! || u - v);
}

/**
 * The graph read along an order of its node rows.
 * @param order the node row at each place, each row once, length n
 * @param values f by node row where it is not the network's own (a swap), length n
 */
export function orderGraph(
  network: Network,
  order: Uint32Array,
  values: Float64Array = network.values,
): OrderedGraph {
  const { nodeCount, edges } = network;
  const place = new Uint32Array(nodeCount);
  order.forEach((row, at) => (place[row] = at));
  const starts = new Uint32Array(nodeCount + 1);
  for (let e = 0; e < edges.length; e += 2) {
    const latest = Math.max(place[edges[e]!]!, place[edges[e + 1]!]!);
    starts[latest + 1] = starts[latest + 1]! + 1;
  }
  for (let i = 0; i < nodeCount; i++) starts[i + 1] = starts[i + 1]! + starts[i]!;
  const earlier = new Uint32Array(edges.length >> 1);
  const next = starts.slice();
  for (let e = 0; e < edges.length; e += 2) {
    const [x, y] = [place[edges[e]!]!, place[edges[e + 1]!]!];
    const latest = Math.max(x, y);
    earlier[next[latest]!] = Math.min(x, y);
    next[latest] = next[latest]! + 1;
  }
  for (let i = 0; i < nodeCount; i++) earlier.subarray(starts[i], starts[i + 1]).sort();
  return {
    nodeCount,
    starts,
    earlier,
    values: Float64Array.from(order, (row) => values[row]! + 0),
  };
}
