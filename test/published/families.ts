/** Graphs of the published checks, nodes 0..n-1 arriving in this order, as lists of edges. */
import type { Network } from '../../jobs/engine/types';
import { networkOf } from '../support/graphs';

type Edge = readonly [number, number];

/** Nodes joined where `joined(u, v)`, u < v. */
export function graphWhere(n: number, joined: (u: number, v: number) => boolean): Network {
  const edges: Edge[] = [];
  for (let v = 1; v < n; v++) for (let u = 0; u < v; u++) if (joined(u, v)) edges.push([u, v]);
  return networkOf(n, edges);
}

export const complete = (n: number) => graphWhere(n, () => true);
export const path = (n: number) => graphWhere(n, (u, v) => v - u === 1);
/** C_n for n >= 3. */
export const cycle = (n: number) => graphWhere(n, (u, v) => v - u === 1 || v - u === n - 1);

export function complement(graph: Network): Network {
  const joined = edgeTest(graph);
  return graphWhere(graph.nodeCount, (u, v) => !joined(u, v));
}

export function edgeTest(graph: Network): (u: number, v: number) => boolean {
  const keys = new Set<string>();
  for (let e = 0; e < graph.edges.length; e += 2) {
    const [u, v] = [graph.edges[e]!, graph.edges[e + 1]!];
    keys.add(`${u},${v}`).add(`${v},${u}`);
  }
  return (u, v) => keys.has(`${u},${v}`);
}

/** K with parts of the given sizes, the nodes of a part following each other. */
export function completeMultipartite(sizes: readonly number[]): Network {
  const part = sizes.flatMap((size, index) => new Array<number>(size).fill(index));
  return graphWhere(part.length, (u, v) => part[u] !== part[v]);
}

/** 1-skeleton of the m-cross-polytope in the order v1..vm, then their antipodes. */
export const crossPolytope = (m: number) => graphWhere(2 * m, (u, v) => v - u !== m);

/** A hub (node 0) joined to every node of C_{n-1}. */
export function wheel(n: number): Network {
  return graphWhere(n, (u, v) => u === 0 || v - u === 1 || v - u === n - 2);
}

/** A complete tree in which every inner node has `branches` children. */
export function tree(branches: number, nodeCount: number): Network {
  return graphWhere(nodeCount, (u, v) => Math.floor((v - 1) / branches) === u);
}

/** C_n^r: joined if the cyclic distance is at most r. */
export function cyclePower(n: number, r: number): Network {
  return graphWhere(n, (u, v) => Math.min(v - u, n - v + u) <= r);
}

/** Nodes are pairs; two of them are joined if they have no end in common: a complement of a line graph. */
function disjointPairs(pairs: readonly Edge[]): Network {
  return graphWhere(pairs.length, (u, v) => pairs[u]!.every((end) => !pairs[v]!.includes(end)));
}

/** Matching complex M_n: the nodes are the edges of K_n. */
export function matchingComplex(n: number): Network {
  const pairs: Edge[] = [];
  for (let v = 1; v < n; v++) for (let u = 0; u < v; u++) pairs.push([u, v]);
  return disjointPairs(pairs);
}

/** Chessboard complex M_{m,n}: the nodes are the edges of K_{m,n}. */
export function chessboardComplex(m: number, n: number): Network {
  const pairs: Edge[] = [];
  for (let row = 0; row < m; row++)
    for (let column = 0; column < n; column++) pairs.push([row, m + column]);
  return disjointPairs(pairs);
}

/** Generalised Petersen graph: an outer n-gon, spokes, and an inner star polygon of step k. */
export function generalisedPetersen(n: number, k: number): Network {
  return graphWhere(2 * n, (u, v) => {
    if (v < n) return v - u === 1 || v - u === n - 1;
    if (u < n) return v - u === n;
    const apart = v - u;
    return apart === k || apart === n - k;
  });
}

/** The Heawood graph: a 14-gon with chords from even i to i + 5. */
export function heawood(): Network {
  return graphWhere(
    14,
    (u, v) => v - u === 1 || v - u === 13 || (u % 2 === 0 ? v - u === 5 : v - u === 9),
  );
}

/** The Groetzsch graph: the Mycielski graph of C_5. */
export function groetzsch(): Network {
  const ring = edgeTest(cycle(5));
  return graphWhere(11, (u, v) => {
    if (v < 5) return ring(u, v);
    if (v < 10) return u < 5 && ring(u, v - 5);
    return u >= 5;
  });
}

type Point = readonly number[];
const squared = (x: Point, y: Point) => x.reduce((sum, value, k) => sum + (value - y[k]!) ** 2, 0);

/** Points joined at the least distance between any two of them. */
function nearest(points: readonly Point[]): Network {
  let least = Infinity;
  for (let v = 1; v < points.length; v++)
    for (let u = 0; u < v; u++) least = Math.min(least, squared(points[u]!, points[v]!));
  return graphWhere(points.length, (u, v) => squared(points[u]!, points[v]!) < least * 1.0001);
}

/** All ways to give signs to the non-zero coordinates. */
function signed(point: Point): Point[] {
  return point.reduce<Point[]>(
    (found, value) =>
      found.flatMap((start) =>
        value === 0
          ? [[...start, 0]]
          : [
              [...start, value],
              [...start, -value],
            ],
      ),
    [[]],
  );
}

/** All, or only the even, permutations of a list. */
function permuted(list: Point, evenOnly: boolean): Point[] {
  const found = new Map<string, Point>();
  const extend = (start: number[], rest: number[], even: boolean) => {
    if (rest.length === 0 && (even || !evenOnly)) found.set(start.join(), start);
    rest.forEach((value, k) =>
      extend(
        [...start, value],
        rest.filter((_, at) => at !== k),
        even === (k % 2 === 0),
      ),
    );
  };
  extend([], [...list], true);
  return [...found.values()];
}

const GOLDEN = (1 + Math.sqrt(5)) / 2;

export const cube = () => nearest(signed([1, 1, 1]));
export const cuboctahedron = () => nearest(permuted([1, 1, 0], false).flatMap(signed));
export const icosahedron = () => nearest(permuted([0, 1, GOLDEN], true).flatMap(signed));
export const dodecahedron = () => generalisedPetersen(10, 2);
export const cell24 = () => nearest(permuted([1, 1, 0, 0], false).flatMap(signed));
export function cell600(): Network {
  return nearest([
    ...permuted([2, 0, 0, 0], false).flatMap(signed),
    ...signed([1, 1, 1, 1]),
    ...permuted([GOLDEN, 1, 1 / GOLDEN, 0], true).flatMap(signed),
  ]);
}

/** n copies of K_size in a ring, neighbours joined by one edge. */
export function disjointUnionOfCliques(copies: number, size: number): Network {
  return graphWhere(copies * size, (u, v) => Math.floor(u / size) === Math.floor(v / size));
}

/** Every labelled graph on n nodes, in the order 0..n-1. */
export function* labelledGraphs(n: number): Generator<Network> {
  const all: Edge[] = [];
  for (let v = 1; v < n; v++) for (let u = 0; u < v; u++) all.push([u, v]);
  for (let mask = 0; mask < 2 ** all.length; mask++) {
    yield networkOf(
      n,
      all.filter((_, k) => (mask >> k) & 1),
    );
  }
}
