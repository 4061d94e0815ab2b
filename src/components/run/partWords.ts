import type { RunPart } from '#contract/enums';
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
