import type { ImportDraft } from '#contract/imports';
import { formatCount, formatNoun } from '../../composables/localeFormat';
import { awaitsDayOrder } from './orderChoices';

export interface FoundLine {
  readonly name: string;
  readonly count: string;
  /** What was done with them. */
  readonly meaning: string;
}

/** Name, count and consequence of everything that was found; lines that count nothing are left out. */
export function foundLines(draft: ImportDraft): FoundLine[] {
  const { found } = draft;
  const lines: FoundLine[] = [];
  const say = (count: number, name: string, meaning: string, always = { shown: false }): void => {
    if (count > 0 || always.shown) lines.push({ name, count: formatCount(count), meaning });
  };
  const always = { shown: true };
  const rows = (count: number): string => `from ${formatNoun(count, 'row')}`;
  const named = found.nodeRows === 0 && found.nodes > 0;
  say(found.nodes, 'Nodes', named ? 'named by the edges' : rows(found.nodeRows), always);
  say(found.edges, 'Edges', rows(found.edgeRows), always);
  say(found.components, 'Components', 'parts without an edge between them', always);
  say(found.isolated, 'Nodes without an edge', 'kept; each is a component');
  const groups = found.ties > 0 ? `, in ${formatNoun(found.ties, 'group')}` : '';
  say(
    found.tiedNodes,
    'Tied nodes',
    `share an entry with another${groups}; they arrive together`,
    always,
  );
  say(found.selfLoops, 'Self loops', 'dropped', always);
  say(found.duplicates, 'Repeated edges', 'folded into one', always);
  say(found.reversed, 'Edges in both directions', 'folded into one; direction is ignored');
  say(found.differingWeights, 'Repeated edges of different weight', 'the largest weight was kept');
  say(found.repeatedLabels, 'Nodes with the label of another', 'kept apart by their ids', always);
  say(found.nodesOnlyInEdges, 'Nodes named only by edges', 'no row of the nodes has their id', {
    shown: !named,
  });
  // While dates cannot be read, those that are there count as missing.
  if (!awaitsDayOrder(draft))
    say(found.nodesWithoutEntry, 'Nodes without an entry', missingMeaning(draft), always);
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
    say(count, `Not kept: ${what}`, 'left out when the file was read');
  say(found.ignoredColumns.length, 'Columns read past', found.ignoredColumns.join(', '), always);
  return lines;
}

const MISSING_MEANING = {
  refuse: 'a fault, as chosen in the step Order',
  leave_out: 'left out, as chosen in the step Order',
  last: 'placed last, as chosen in the step Order',
} as const;

const missingMeaning = ({ choices, found }: ImportDraft): string =>
  found.nodesWithoutEntry > 0 ? MISSING_MEANING[choices.missing] : '';
