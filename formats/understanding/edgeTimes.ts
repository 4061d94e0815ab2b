import { type IssueList } from '../issues';
import { isMissing } from '../sources/cellKinds';
import { ownText } from '../sources/ownText';
import type { ImportChoices } from './choices';
import type { EdgeIndices } from './edgeRows';
import { NO_TIMES, type NodeTimes, type TimedNodes } from './draft';
import type { NodeList } from './nodeRows';
import type { PickedTable } from './tables';
import { TimeScale, type ScaledTime } from './timeScale';

/** The earliest time of any edge row at each node, self loops with the rest; nodes without one have the entry null. */
export function timesByFirstEdge(
  { file, table }: PickedTable,
  at: EdgeIndices,
  list: NodeList,
  choices: Pick<ImportChoices, 'decimal' | 'dayOrder' | 'years'>,
  issues: IssueList,
): TimedNodes {
  const field = 'time';
  const scale = new TimeScale(file, choices);
  for (const { line, cells } of table.rows()) scale.see(cells[at.time] ?? '', { line, field });
  const ambiguous = scale.settle(issues);
  const best: ({ time: ScaledTime; raw: string } | undefined)[] = list.nodes.map(() => undefined);
  let edgesWithoutTime = 0;
  for (const { line, cells } of table.rows()) {
    const raw = cells[at.time] ?? '';
    const time = scale.scaled(raw, { line, field }, issues);
    if (!time) {
      if (isMissing(raw)) edgesWithoutTime++;
      continue;
    }
    for (const end of [at.source, at.target]) {
      const row = list.row(cells[end] ?? '');
      if (row === undefined) continue;
      const known = best[row];
      if (!known || time.value < known.time.value) best[row] = { time, raw: ownText(raw) };
    }
  }
  const counts = { given: 0, years: 0, months: 0 };
  const times = best.map((found): NodeTimes => {
    if (!found) return NO_TIMES;
    const { time, raw } = found;
    if (time.of !== null) counts[time.of === 'year' ? 'years' : 'months']++;
    return {
      ...NO_TIMES,
      entryRaw: raw,
      entry: time.value,
      earliest: time.first,
      latest: time.last,
    };
  });
  return { unit: scale.unit, times, ...counts, edgesWithoutTime, ambiguous };
}
