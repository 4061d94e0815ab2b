import type { DifferenceBody } from '#contract/revisions';
import { formatCount, formatNoun } from '../../composables/localeFormat';

/** One kind of difference as a table. */
export interface DifferenceTable {
  readonly title: string;
  readonly columns: readonly string[];
  readonly rows: readonly (readonly string[])[];
  /** Said where more differ than are listed. */
  readonly leftOut: string | null;
}

type Window = DifferenceBody['windowsChanged'][number]['before'];
const windowWords = ({ earliest, latest }: Window): string =>
  earliest === null && latest === null ? 'none' : `${earliest ?? 'open'} to ${latest ?? 'open'}`;

/** Of an edge, which has no direction. */
const ENDS = ['Id of one end', 'Id of the other'];

/** The kinds of difference that there are, nodes first. */
export function differenceTables(found: DifferenceBody): DifferenceTable[] {
  const { counts } = found;
  const node = ({ id, label }: { id: string; label: string }) => [label, id];
  const edge = ({ a, b }: { a: string; b: string }) => [a, b];
  const all: [string, number, string[], string[][]][] = [
    ['Nodes added', counts.nodesAdded, ['Label', 'Id'], found.nodesAdded.map(node)],
    ['Nodes removed', counts.nodesRemoved, ['Label', 'Id'], found.nodesRemoved.map(node)],
    [
      'Nodes with another label',
      counts.relabelled,
      ['Id', 'Label before', 'Label now'],
      found.relabelled.map(({ id, before, after }) => [id, before, after]),
    ],
    [
      'Entries changed',
      counts.entriesChanged,
      ['Node', 'Entry before', 'Entry now'],
      found.entriesChanged.map(({ label, before, after }) => [label, before, after]),
    ],
    [
      'Windows changed',
      counts.windowsChanged,
      ['Node', 'Window before', 'Window now'],
      found.windowsChanged.map(({ label, before, after }) => [
        label,
        windowWords(before),
        windowWords(after),
      ]),
    ],
    ['Edges added', counts.edgesAdded, ENDS, found.edgesAdded.map(edge)],
    ['Edges removed', counts.edgesRemoved, ENDS, found.edgesRemoved.map(edge)],
  ];
  return all
    .filter(([, count]) => count > 0)
    .map(([title, count, columns, rows]) => ({
      title: `${title}: ${formatCount(count)}`,
      columns,
      rows,
      leftOut:
        rows.length < count
          ? `The first ${formatCount(rows.length)} are listed; ${formatCount(count - rows.length)} more are not.`
          : null,
    }));
}

/** The difference in one or two sentences. */
export function differenceWords({ counts, rowsMoved, units }: DifferenceBody): string {
  const parts: string[] = [];
  const say = (count: number, words: string): void => {
    if (count > 0) parts.push(words);
  };
  say(counts.nodesAdded, `${formatNoun(counts.nodesAdded, 'node')} added`);
  say(counts.nodesRemoved, `${formatNoun(counts.nodesRemoved, 'node')} removed`);
  say(counts.relabelled, `${formatNoun(counts.relabelled, 'node')} relabelled`);
  say(counts.entriesChanged, `${formatNoun(counts.entriesChanged, 'entry', 'entries')} changed`);
  say(counts.windowsChanged, `${formatNoun(counts.windowsChanged, 'window')} changed`);
  say(counts.edgesAdded, `${formatNoun(counts.edgesAdded, 'edge')} added`);
  say(counts.edgesRemoved, `${formatNoun(counts.edgesRemoved, 'edge')} removed`);
  const words = [parts.length > 0 ? `${parts.join(', ')}.` : 'The nodes and edges are the same.'];
  if (units.before !== units.after) words.push('The entries count in another unit.');
  if (rowsMoved) words.push('The nodes stand in another order of rows, which orders ties.');
  return words.join(' ');
}
