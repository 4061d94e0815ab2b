import { quoted, type IssueList } from '../issues';
import type { ImportChoices } from './choices';
import { NO_TIMES, type DraftNode, type NodeTimes, type TimedNodes } from './draft';
import { brokenText } from './nodeRows';
import { TimeScale, type ScaledTime } from './timeScale';

const FIELDS = ['entry', 'earliest', 'latest'] as const;

/**
 * Times of the nodes from the columns of their table. Nodes without a row, and nodes whose entry
 * is missing, have the entry null.
 */
export function timesByColumn(
  file: string,
  nodes: readonly DraftNode[],
  choices: Pick<ImportChoices, 'decimal' | 'dayOrder' | 'years'>,
  issues: IssueList,
): TimedNodes {
  const scale = new TimeScale(file, choices);
  for (const { line, listed, raw } of nodes) {
    if (!listed) continue;
    for (const field of FIELDS) {
      scale.see(raw[field], { line, field });
      const broken = brokenText(raw[field]);
      if (broken) issues.add({ file, line, field, message: `${quoted(raw[field])} ${broken}` });
    }
  }
  const ambiguous = scale.settle(issues);
  const counts = { given: 0, years: 0, months: 0 };
  const times = nodes.map((node) => {
    if (!node.listed) return NO_TIMES;
    const [entry, earliest, latest] = FIELDS.map((field) =>
      scale.scaled(node.raw[field], { line: node.line, field }, issues),
    );
    return windowed(file, node, { entry, earliest, latest }, counts, issues);
  });
  return { unit: scale.unit, times, ...counts, edgesWithoutTime: 0, ambiguous };
}

interface Scaled {
  readonly entry: ScaledTime | null | undefined;
  readonly earliest: ScaledTime | null | undefined;
  readonly latest: ScaledTime | null | undefined;
}

/**
 * Entry and window of one node. An entry that is a month or a year is the middle of what the window
 * leaves of it, and its ends are the window where the file gives none.
 */
function windowed(
  file: string,
  { line, raw }: DraftNode,
  scaled: Scaled,
  counts: { given: number; years: number; months: number },
  issues: IssueList,
): NodeTimes {
  const entry = scaled.entry ?? null;
  const from = scaled.earliest?.first ?? scaled.earliest?.value ?? null;
  const until = scaled.latest?.last ?? scaled.latest?.value ?? null;
  const add = (field: string, message: string) => issues.add({ file, line, field, message });
  if (from !== null && until !== null && from > until) {
    add(
      'latest',
      `The latest ${quoted(raw.latest)} is before the earliest ${quoted(raw.earliest)}. Correct one of them.`,
    );
  }
  const times = { entryRaw: raw.entry, earliestRaw: raw.earliest, latestRaw: raw.latest };
  if (entry === null) return { ...times, entry: null, earliest: from, latest: until };
  const first = Math.max(entry.first ?? entry.value, from ?? -Infinity);
  const last = Math.min(entry.last ?? entry.value, until ?? Infinity);
  if (from !== null && from > (entry.last ?? entry.value)) {
    add(
      'earliest',
      `The earliest ${quoted(raw.earliest)} is after the entry ${quoted(raw.entry)}. Correct one of them.`,
    );
  } else if (until !== null && until < (entry.first ?? entry.value)) {
    add(
      'latest',
      `The latest ${quoted(raw.latest)} is before the entry ${quoted(raw.entry)}. Correct one of them.`,
    );
  }
  if (from !== null || until !== null) counts.given++;
  if (entry.of === null) return { ...times, entry: entry.value, earliest: from, latest: until };
  if (from === null && until === null) counts[entry.of === 'year' ? 'years' : 'months']++;
  return {
    ...times,
    entry: from === null && until === null ? entry.value : Math.floor((first + last) / 2),
    earliest: from ?? entry.first,
    latest: until ?? entry.last,
  };
}
