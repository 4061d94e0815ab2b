import type { IssueList } from '../issues';
import type { ImportChoices } from './choices';
import type { PickedTables } from './tables';

/** Reports choices that cannot be followed whatever the rows hold. */
export function checkChoices(
  { columns, tolerance, weights }: ImportChoices,
  { nodes, edges }: PickedTables,
  issues: IssueList,
): void {
  const add = (file: string, message: string) => issues.add({ file, message });
  if (!nodes && !edges && !issues.any)
    add('', 'There is no file with nodes or edges to understand.');
  if (nodes && columns.nodes.id === null)
    add(
      nodes.file,
      'No column is chosen that names the nodes. Choose one with a name of its own for each.',
    );
  if (edges && (columns.edges.source === null || columns.edges.target === null))
    add(edges.file, 'An edge has two ends: choose the two columns that name them.');
  else if (edges && columns.edges.source === columns.edges.target)
    add(edges.file, 'Both ends of the edges are the same column. Choose two different ones.');
  if (tolerance !== null && !(tolerance >= 0 && Number.isFinite(tolerance)))
    add('', 'The tolerance has to be a number from 0 upwards.');
  if (weights.kind !== 'all' && columns.edges.weight === null)
    add(
      edges?.file ?? '',
      'No column of weights is chosen, so the edges cannot be told apart by weight.',
    );
  if (weights.kind === 'density' && !(weights.share >= 0 && weights.share <= 1))
    add('', 'The density has to be a number from 0 to 1.');
  if (weights.kind === 'threshold' && !Number.isFinite(weights.least))
    add('', 'The least weight has to be a number.');
}
