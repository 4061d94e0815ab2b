import { describe, expect, it } from 'vitest';
import { withColumn } from '../../src/components/import/columnChange';
import { draftOf } from './importDraft';

const guessed = draftOf().choices;
const answered = {
  ...guessed,
  dayOrder: 'day_first',
  years: 'dates',
  missing: 'last',
  tolerance: 2,
} as const;
const asked = { dayOrder: null, years: 'numbers', missing: 'refuse' };

describe('what was answered about times', () => {
  it('is asked anew where the entry column changes, and nothing else is', () => {
    const columns = { ...guessed.columns, nodes: { ...guessed.columns.nodes, entry: 'seen' } };
    const changed = withColumn(answered, 'nodes', 'entry', 'seen');
    expect(changed).toEqual({ ...answered, ...asked, columns });
  });

  it('stays where another column changes, or one that the order does not come from', () => {
    expect(withColumn(answered, 'nodes', 'label', 'name')).toMatchObject({ missing: 'last' });
    expect(withColumn(answered, 'edges', 'time', 'seen')).toMatchObject({ missing: 'last' });
    const byEdge = { ...answered, order: { kind: 'first_edge' } } as const;
    expect(withColumn(byEdge, 'nodes', 'entry', 'seen')).toMatchObject({ dayOrder: 'day_first' });
    expect(withColumn(byEdge, 'edges', 'time', 'seen')).toMatchObject({ dayOrder: null });
  });

  it('is of the entry column once one is chosen where rows had to give the order', () => {
    const nodes = { ...guessed.columns.nodes, entry: null };
    const edges = { ...guessed.columns.edges, time: null };
    const rows = { ...guessed, order: { kind: 'rows' }, columns: { nodes, edges } } as const;
    expect(withColumn(rows, 'nodes', 'entry', 'seen').order).toEqual({ kind: 'column' });
    expect(withColumn(rows, 'nodes', 'label', 'name').order).toEqual({ kind: 'rows' });
  });
});
