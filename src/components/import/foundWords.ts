import type { ImportDraft } from '#contract/imports';
import { formatCount } from '../../composables/localeFormat';

export interface FoundLine {
  readonly name: string;
  readonly count: string;
  /** What was done with them. */
  readonly meaning: string;
}

type Found = ImportDraft['found'];

/** Name, count and consequence of everything that was found; lines that count nothing are left out. */
export function foundLines(found: Found): FoundLine[] {
  const lines: FoundLine[] = [];
  const say = (count: number, name: string, meaning: string, always = { shown: false }): void => {
    if (count > 0 || always.shown) lines.push({ name, count: formatCount(count), meaning });
  };
  say(found.nodes, 'Nodes', `from ${formatCount(found.nodeRows)} rows`, { shown: true });
  say(found.edges, 'Edges', `from ${formatCount(found.edgeRows)} rows`, { shown: true });
  say(found.components, 'Components', 'parts without an edge between them');
  say(found.isolated, 'Nodes without an edge', 'kept; each is a component');
  say(
    found.tiedNodes,
    'Tied nodes',
    `share an entry, in ${formatCount(found.ties)} groups; they arrive at the same step`,
  );
  say(found.selfLoops, 'Self loops', 'dropped');
  say(found.duplicates, 'Repeated edges', 'folded into one');
  say(found.reversed, 'Edges in both directions', 'folded into one; direction is ignored');
  say(found.differingWeights, 'Repeated edges of different weight', 'the largest weight was kept');
  say(found.repeatedLabels, 'Nodes with the label of another', 'kept apart by their ids');
  say(found.nodesOnlyInEdges, 'Nodes named only by edges', 'no row of the node table has their id');
  say(found.nodesWithoutEntry, 'Nodes without an entry', 'see the step Order');
  say(found.placedLast, 'Nodes placed last', 'they had no entry');
  say(found.nodesLeftOut, 'Nodes left out', 'they had no entry');
  say(found.edgesLeftOut, 'Edges left out', 'an end of theirs was left out');
  say(found.edgesWithoutTime, 'Edges without a time', 'they give no node its entry');
  say(found.edgesBelowThreshold, 'Edges below the threshold', 'left out');
  say(found.edgesWithoutWeight, 'Edges without a weight', 'left out by the threshold');
  say(found.windows.given, 'Windows given', 'earliest and latest as written');
  say(found.windows.years, 'Windows of a year', 'only the year was given');
  say(found.windows.months, 'Windows of a month', 'only the month was given');
  say(found.windows.tolerance, 'Windows from the tolerance', 'entry ± tolerance');
  for (const { what, count } of found.dropped)
    say(count, `Not kept: ${what}`, 'dropped by the reader');
  say(found.ignoredColumns.length, 'Columns read past', found.ignoredColumns.join(', '));
  return lines;
}
