import type { Barcode, Bars, Network } from '../../jobs/engine/types';

/** All cliques of at most `most` nodes, as ascending lists of node rows. */
export function allCliques(network: Network, most: number): number[][] {
  const n = network.nodeCount;
  const joined = Array.from({ length: n }, () => new Set<number>());
  for (let e = 0; e < network.edges.length; e += 2) {
    joined[network.edges[e]!]!.add(network.edges[e + 1]!);
    joined[network.edges[e + 1]!]!.add(network.edges[e]!);
  }
  const found: number[][] = [];
  const grow = (clique: number[], candidates: number[]) => {
    if (clique.length > 0) found.push(clique);
    if (clique.length === most) return;
    candidates.forEach((v, i) => {
      const rest = candidates.slice(i + 1).filter((u) => joined[v]!.has(u));
      grow([...clique, v], rest);
    });
  };
  grow(
    [],
    Array.from({ length: n }, (_, v) => v),
  );
  return found;
}

/** A column of the boundary matrix as a bitset over the simplices. */
function highestBit(words: Uint32Array): number {
  for (let w = words.length - 1; w >= 0; w--) {
    if (words[w] !== 0) return 32 * w + 31 - Math.clz32(words[w]!);
  }
  return -1;
}

/**
 * The definition, column by column (Edelsbrunner, Letscher, Zomorodian 2002): sort the cliques by
 * (f, dimension, nodes), reduce every column, read the pairs.
 */
export function slowBarcode(
  cliques: readonly number[][],
  values: ArrayLike<number>,
  maxDimension: number,
): Barcode {
  const sorted = cliques.map((nodes) => ({
    nodes,
    key: nodes.join(),
    time: nodes.reduce((most, v) => Math.max(most, values[v]!), -Infinity),
  }));
  sorted.sort(
    (x, y) => x.time - y.time || x.nodes.length - y.nodes.length || (x.key < y.key ? -1 : 1),
  );
  const index = new Map(sorted.map(({ key }, i) => [key, i]));
  const columns = new Map<number, Uint32Array>();
  const positive = new Set<number>();
  const bars: [number, number][][] = Array.from({ length: maxDimension + 1 }, () => []);
  sorted.forEach(({ nodes, time }, i) => {
    const column = new Uint32Array((sorted.length + 31) >>> 5);
    for (let k = 0; nodes.length > 1 && k < nodes.length; k++) {
      const facet = index.get(nodes.filter((_, at) => at !== k).join())!;
      column[facet >>> 5]! ^= 1 << (facet & 31);
    }
    let pivot = highestBit(column);
    for (let other = columns.get(pivot); other !== undefined; other = columns.get(pivot)) {
      for (let w = 0; w < column.length; w++) column[w]! ^= other[w]!;
      pivot = highestBit(column);
    }
    if (pivot < 0) {
      positive.add(i);
      return;
    }
    columns.set(pivot, column);
    positive.delete(pivot);
    const born = sorted[pivot]!;
    if (born.time < time) bars[born.nodes.length - 1]!.push([born.time, time]);
  });
  for (const i of positive) {
    const { nodes, time } = sorted[i]!;
    bars[nodes.length - 1]?.push([time, Infinity]);
  }
  return bars.map((list): Bars => {
    list.sort((x, y) => x[0] - y[0] || (x[1] === y[1] ? 0 : x[1] - y[1]));
    return {
      births: Float64Array.from(list, ([birth]) => birth),
      deaths: Float64Array.from(list, ([, death]) => death),
    };
  });
}

function pairsOf(bars: Bars, infinite: boolean): [number, number][] {
  const pairs: [number, number][] = [];
  bars.births.forEach((birth, i) => {
    if ((bars.deaths[i] === Infinity) === infinite) pairs.push([birth, bars.deaths[i]!]);
  });
  return pairs;
}

type Pair = readonly [number, number];
const between = (x: Pair, y: Pair) => Math.max(Math.abs(x[0] - y[0]), Math.abs(x[1] - y[1]));
const half = (x: Pair) => (x[1] - x[0]) / 2;

/** True if both diagrams, each padded with the other's projections, have a perfect matching. */
function feasible(left: readonly Pair[], right: readonly Pair[], delta: number): boolean {
  const size = left.length + right.length;
  const fits = (i: number, j: number) => {
    if (i < left.length && j < right.length) return between(left[i]!, right[j]!) <= delta;
    if (i < left.length) return j - right.length === i && half(left[i]!) <= delta;
    if (j < right.length) return i - left.length === j && half(right[j]!) <= delta;
    return true;
  };
  const partner = new Array<number>(size).fill(-1);
  const place = (i: number, seen: boolean[]): boolean => {
    for (let j = 0; j < size; j++) {
      if (seen[j] === true || !fits(i, j)) continue;
      seen[j] = true;
      if (partner[j] === -1 || place(partner[j]!, seen)) {
        partner[j] = i;
        return true;
      }
    }
    return false;
  };
  for (let i = 0; i < size; i++) if (!place(i, [])) return false;
  return true;
}

/** The exact bottleneck distance by trying all candidates for its value. */
export function slowDistance(before: Bars, after: Bars): number {
  const [bornBefore, bornAfter] = [pairsOf(before, true), pairsOf(after, true)];
  if (bornBefore.length !== bornAfter.length) return Infinity;
  const infinite = bornBefore.map(([birth], i) => Math.abs(birth - bornAfter[i]![0]));
  const [left, right] = [pairsOf(before, false), pairsOf(after, false)];
  const candidates = new Set([0, ...left.map(half), ...right.map(half)]);
  for (const x of left) for (const y of right) candidates.add(between(x, y));
  const values = [...candidates].sort((x, y) => x - y);
  let [low, high] = [0, values.length - 1];
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (feasible(left, right, values[middle]!)) high = middle;
    else low = middle + 1;
  }
  return Math.max(values[low]!, ...infinite);
}

/** The largest difference of the Betti curves, looked at every value of f. */
export function slowBettiGap(before: Bars, after: Bars, values: Iterable<number>): number {
  const alive = ({ births, deaths }: Bars, t: number) =>
    births.reduce((count, birth, i) => count + (birth <= t && t < deaths[i]! ? 1 : 0), 0);
  let largest = 0;
  for (const t of values) largest = Math.max(largest, Math.abs(alive(before, t) - alive(after, t)));
  return largest;
}
