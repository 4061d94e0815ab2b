import { missingPosition } from './choice';
import { EngineInputError, type Part } from './types';

/** The pairs of a part, row by row; nothing is held beyond the row that is asked for. */
export interface Partners {
  readonly nodeCount: number;
  /** Positions q > p of the pairs (p, q), ascending. */
  readonly of: (p: number) => Uint32Array;
}

/** @throws EngineInputError for a part that names positions the network does not have */
export function partnersOf(part: Part, nodeCount: number): Partners {
  switch (part.kind) {
    case 'whole':
      return { nodeCount, of: (p) => range(p + 1, nodeCount) };
    case 'within':
      return within(part.positions, nodeCount);
    case 'overlapping':
      return overlapping(part.starts, part.ends, nodeCount);
    case 'chosen':
      return chosen(part, nodeCount);
  }
}

/** The pairs that another part left out. */
export function remainderOf({ nodeCount, of }: Partners): Partners {
  return {
    nodeCount,
    of(p) {
      const taken = new Set(of(p));
      return range(p + 1, nodeCount).filter((q) => !taken.has(q));
    },
  };
}

/** Number of pairs of a part. O(pairs), and O(n²) for overlapping intervals. */
export function countPairs(partners: Partners): number {
  let pairs = 0;
  for (let p = 0; p < partners.nodeCount; p++) pairs += partners.of(p).length;
  return pairs;
}

function range(from: number, end: number): Uint32Array {
  const positions = new Uint32Array(Math.max(0, end - from));
  for (let i = 0; i < positions.length; i++) positions[i] = from + i;
  return positions;
}

function within(positions: number, nodeCount: number): Partners {
  if (!Number.isInteger(positions) || positions < 1) {
    throw new EngineInputError(
      `Pairs within ${positions} arrival positions: give a whole number of at least 1.`,
    );
  }
  return { nodeCount, of: (p) => range(p + 1, Math.min(nodeCount, p + 1 + positions)) };
}

/** Two closed intervals overlap where neither ends before the other begins. */
function overlapping(starts: Float64Array, ends: Float64Array, nodeCount: number): Partners {
  if (starts.length !== nodeCount || ends.length !== nodeCount) {
    throw new EngineInputError('Overlapping intervals need one interval per node.');
  }
  return {
    nodeCount,
    of: (p) =>
      range(p + 1, nodeCount).filter((q) => starts[q]! <= ends[p]! && starts[p]! <= ends[q]!),
  };
}

function chosen(
  { windows, nodes, pairs }: Extract<Part, { kind: 'chosen' }>,
  nodeCount: number,
): Partners {
  const positions = [...windows.flat(), ...nodes, ...pairs.flat()];
  const missing = positions.find((p) => !Number.isInteger(p) || p < 0 || p >= nodeCount);
  if (missing !== undefined) throw missingPosition(missing, nodeCount);
  const whole = new Set(nodes);
  const single = new Map<number, number[]>();
  for (const [a, b] of pairs) {
    const p = Math.min(a, b);
    single.set(p, [...(single.get(p) ?? []), Math.max(a, b)]);
  }
  return {
    nodeCount,
    of(p) {
      if (whole.has(p)) return range(p + 1, nodeCount);
      const found = new Set<number>(single.get(p));
      for (const q of whole) found.add(q);
      for (const [from, to] of windows) {
        if (from <= p) for (let q = p + 1; q <= to; q++) found.add(q);
      }
      return Uint32Array.from(found)
        .filter((q) => q > p)
        .sort();
    },
  };
}
