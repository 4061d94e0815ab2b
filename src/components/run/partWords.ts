import { CHOSEN_LIMITS, runPartSchema, type RunPart } from '#contract/enums';
import { formatNoun } from '../../composables/localeFormat';

/** Which pairs a run covers, e.g. "pairs within 5 positions". */
export function partWords(part: RunPart): string {
  switch (part.kind) {
    case 'whole':
      return 'every pair';
    case 'within':
      return `pairs within ${formatNoun(part.positions, 'position')}`;
    case 'overlapping':
      return 'pairs whose intervals overlap';
    case 'chosen': {
      const { windows, nodes, pairs } = part;
      const counted = [
        [windows.length, 'window'],
        [nodes.length, 'whole node'],
        [pairs.length, 'single pair'],
      ] as const;
      const words = counted.filter(([count]) => count > 0).map(([n, noun]) => formatNoun(n, noun));
      return `chosen pairs (${words.join(', ')})`;
    }
  }
}

/** Arrivals as a person writes them, from 1. */
export interface WrittenPairs {
  /** "1-40, 100-120" */
  readonly windows: string;
  /** "5, 17" */
  readonly nodes: string;
  /** "3-19, 4-8" */
  readonly pairs: string;
}

/**
 * @param order node row at every arrival position
 * @returns the part, or a sentence that says what is wrong
 */
export function readChosen(written: WrittenPairs, order: Uint32Array): RunPart | string {
  const n = order.length;
  const windows = written.windows.trim() === '' ? [] : readWindows(written.windows, n);
  if (typeof windows === 'string') return windows;
  const pairs = written.pairs.trim() === '' ? [] : readWindows(written.pairs, n);
  if (typeof pairs === 'string') return pairs;
  const nodes: number[] = [];
  for (const piece of written.nodes.split(/[\s,;]+/).filter((one) => one !== '')) {
    const arrival = Number(piece);
    if (!Number.isInteger(arrival) || arrival < 1 || arrival > n) {
      return `“${piece}” is no arrival; they count from 1 to ${n}.`;
    }
    nodes.push(order[arrival - 1] ?? 0);
  }
  if (windows.length + nodes.length + pairs.length === 0) {
    return 'Write at least one window, node or pair.';
  }
  const rows = ([p, q]: [number, number]): [number, number] => [order[p] ?? 0, order[q] ?? 0];
  const part = runPartSchema.safeParse({ kind: 'chosen', windows, nodes, pairs: pairs.map(rows) });
  if (part.success) return part.data;
  const { windows: w, nodes: v, pairs: e } = CHOSEN_LIMITS;
  return `At most ${w} windows, ${v} nodes and ${e} pairs can be chosen; leave some out.`;
}

/**
 * Windows as a person writes them: "1-40, 100-120", positions counted from 1.
 * @returns first and last position from 0, or a sentence that says what is wrong
 */
export function readWindows(text: string, nodeCount: number): [number, number][] | string {
  const windows: [number, number][] = [];
  for (const piece of text.split(/[,;]/).map((one) => one.trim())) {
    if (piece === '') continue;
    const found = /^(\d+)\s*[-–]\s*(\d+)$/.exec(piece);
    if (!found) return `“${piece}” is no window; write first and last arrival, such as 1-40.`;
    const [from, to] = [Number(found[1]), Number(found[2])];
    if (from < 1 || to <= from || to > nodeCount) {
      return `“${piece}” does not fit: arrivals count from 1 to ${nodeCount}, the first before the last.`;
    }
    windows.push([from - 1, to - 1]);
  }
  return windows.length === 0 ? 'Write at least one window, such as 1-40.' : windows;
}
