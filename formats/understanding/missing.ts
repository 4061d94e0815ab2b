import { type IssueList } from '../issues';
import type { EntryUnit } from '../types';
import type { MissingPolicy } from './choices';
import type { DraftNode, NodeTimes } from './draft';

/** What was done with the nodes that have no entry. */
export interface Placed {
  /** By node row; null where the node is left out. */
  readonly times: readonly (NodeTimes | null)[];
  readonly placedLast: number;
  readonly leftOut: number;
}

/** The words of the unit in which placed nodes follow the last one. */
const STEP: Readonly<Record<EntryUnit, string>> = {
  number: 'one after the last entry',
  days: 'one day after the last entry',
  seconds: 'one second after the last entry',
};

/** Said in the report about nodes placed last. */
export const placedWords = (count: number, unit: EntryUnit): string =>
  `${count} ${count === 1 ? 'node has' : 'nodes have'} no entry and ${count === 1 ? 'was' : 'were'} placed ${STEP[unit]}, tied; as ${count === 1 ? 'it' : 'they'} may have arrived at any time, the window is the whole record.`;

/**
 * Nodes without an entry, as chosen: each is an issue; or is left out; or is placed one unit after the
 * last entry, tied with the others placed so, its window reaching back to the first entry because
 * nothing is known about it.
 */
export function placeMissing(
  nodes: readonly DraftNode[],
  times: readonly NodeTimes[],
  policy: MissingPolicy,
  why: (node: DraftNode) => string,
  issues: IssueList,
): Placed {
  const entries = times.flatMap(({ entry }) => (entry === null ? [] : [entry]));
  const first = entries.reduce((least, entry) => Math.min(least, entry), Infinity);
  const last = entries.reduce((most, entry) => Math.max(most, entry), -Infinity);
  let placedLast = 0;
  let leftOut = 0;
  const placed = times.map((own, row): NodeTimes | null => {
    if (own.entry !== null) return own;
    const node = nodes[row];
    if (policy === 'leave_out') {
      leftOut++;
      return null;
    }
    if (policy === 'refuse' || entries.length === 0) {
      if (node) {
        const { file, line } = node;
        issues.add({ file, line, ...(node.listed ? { field: 'entry' } : {}), message: why(node) });
      }
      return own;
    }
    placedLast++;
    const entry = Math.max(last + 1, own.earliest ?? -Infinity);
    return {
      ...own,
      entry,
      earliest: own.earliest ?? first,
      latest: Math.max(own.latest ?? entry, entry),
    };
  });
  return { times: placed, placedLast, leftOut };
}
