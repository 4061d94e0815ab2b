import type { ImportReport } from '#contract/datasets';
import type { RevisionOrigin } from '#contract/revisions';
import { formatCount, formatNoun } from '../../composables/localeFormat';

/** @returns what reading the files dropped, folded and noticed, one plain sentence each. */
export function importWords(report: ImportReport): string[] {
  const words = report.origin ? [originWords(report.origin)] : [];
  const say = (count: number, sentence: string): void => {
    if (count > 0) words.push(sentence);
  };
  const { selfLoops, duplicateEdges, reversedEdges, tiedNodes, repeatedLabels } = report;
  say(selfLoops, `${formatNoun(selfLoops, 'self loop')} dropped.`);
  say(duplicateEdges, `${formatNoun(duplicateEdges, 'repeated edge')} dropped.`);
  say(
    reversedEdges,
    `${formatNoun(reversedEdges, 'edge')} repeated with source and target exchanged, dropped.`,
  );
  say(tiedNodes, `${formatNoun(tiedNodes, 'node')} with an entry that another node has too.`);
  say(repeatedLabels, `${formatNoun(repeatedLabels, 'label')} on more than one node.`);
  say(report.isolatedNodes, `${formatNoun(report.isolatedNodes, 'node')} without an edge.`);
  say(report.components > 1 ? 1 : 0, `${formatCount(report.components)} separate components.`);
  say(report.ignoredColumns.length, `Columns read past: ${report.ignoredColumns.join(', ')}.`);
  return words.length > 0 ? words : ['Nothing was dropped or folded.'];
}

/** @returns how a revision was made from another. */
function originWords(origin: RevisionOrigin): string {
  if (origin.kind === 'threshold') {
    const lighter = `${formatNoun(origin.below, 'lighter edge')} left out`;
    const bare = `${formatCount(origin.withoutWeight)} without a weight`;
    return `Made from revision ${origin.from}: edges of weight ${origin.least} or more; ${lighter}${origin.withoutWeight > 0 ? `, and ${bare}` : ''}.`;
  }
  const each = origin.corrections.map(
    ({ id, before, after, note }) => `${id}: ${before} → ${after}${note ? ` (${note})` : ''}`,
  );
  const more = each.length > 5 ? ` and ${formatCount(each.length - 5)} more` : '';
  return `Made from revision ${origin.from} by correcting ${each.slice(0, 5).join('; ')}${more}.`;
}
