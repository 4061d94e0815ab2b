import { describe, expect, it } from 'vitest';
import type { ImportDraft } from '#contract/imports';
import {
  columnFault,
  columnRoles,
  pickedTable,
  withColumnNames,
} from '../../src/components/import/columnFields';
import { missingLabel, orderFault } from '../../src/components/import/orderChoices';
import { IMPORT_STEPS, shortNeeds, stepNeeds } from '../../src/components/import/steps';
import { draftOf, tableFile } from './importDraft';

const draft = draftOf();
const { choices } = draft;
const edgesOf = (source: string | null, target: string | null) =>
  draftOf({
    choices: {
      ...choices,
      columns: { ...choices.columns, edges: { ...choices.columns.edges, source, target } },
    },
  });
const DAY_QUESTION: ImportDraft['questions'][number] = {
  kind: 'day_order',
  ...{ file: 'nodes.csv', column: 'seen', text: 'Day or month?' },
  ...{ blocking: true, examples: ['01/02/2031'] },
};

describe('what a step of an import still needs', () => {
  it('is nothing where all is chosen and read', () => {
    expect(IMPORT_STEPS.flatMap((step) => stepNeeds(step, draft))).toEqual([]);
    expect(IMPORT_STEPS.map((step) => shortNeeds(step, draft)).join('')).toBe('');
  });

  it('is each file that could not be read, by name', () => {
    const unread = { ...tableFile(0, 'p.gml', 'nodes', []), nodes: null };
    expect(stepNeeds('files', draftOf({ files: [unread] }))).toEqual([
      expect.stringContaining('p.gml'),
    ]);
  });

  it('is a column for each end of the edges, and two different ones', () => {
    expect(stepNeeds('columns', edgesOf('from', null))).toHaveLength(1);
    expect(columnFault(edgesOf('from', null), 'edges', 'target')).toMatch(/two ends/);
    expect(columnFault(edgesOf('from', null), 'edges', 'source')).toBeUndefined();
    expect(stepNeeds('columns', edgesOf('to', 'to'))).toHaveLength(1);
    expect(columnFault(edgesOf('to', 'to'), 'edges', 'target')).toMatch(/same column/);
  });

  it('is a column to take the order from, and every question that blocks', () => {
    const first = draftOf({ choices: { ...choices, order: { kind: 'first_edge' } } });
    expect(orderFault(first)).toMatch(/column of times/);
    expect(stepNeeds('order', first)).toEqual([orderFault(first)]);
    expect(stepNeeds('order', draftOf({ questions: [DAY_QUESTION] }))).toEqual(['Day or month?']);
    const open = { ...DAY_QUESTION, blocking: false };
    expect(stepNeeds('order', draftOf({ questions: [open] }))).toEqual([]);
  });

  it('counts no node as without an entry while its date cannot be read', () => {
    const found = { ...draft.found, nodes: 6, nodesWithoutEntry: 4 };
    expect(missingLabel(draftOf({ found }))).toContain('4');
    expect(missingLabel(draftOf({ found, questions: [DAY_QUESTION] }))).not.toContain('4');
  });
});

describe('the columns of an import', () => {
  it('are those of a table of its own before those of a graph file', () => {
    const graph = { ...tableFile(0, 'net.gml', 'nodes', ['id']), format: 'gml' as const };
    const own = tableFile(1, 'nodes.csv', 'nodes', ['id', 'seen']);
    expect(pickedTable(draftOf({ files: [graph, own] }), 'nodes')?.file).toBe('nodes.csv');
    expect(pickedTable(draftOf({ files: [graph] }), 'nodes')?.file).toBe('net.gml');
    expect(pickedTable(draftOf({ files: [graph] }), 'edges')).toBeNull();
  });

  it('may have two meanings, and any name', () => {
    const roles = columnRoles('nodes', { id: 'constructor', label: 'constructor', entry: null });
    expect([...roles]).toEqual([['constructor', 'Id, Label']]);
    expect(roles.has('toString')).toBe(false);
  });

  it('are named in problems as in their file', () => {
    const issues = [
      { file: 'nodes.csv', line: 4, field: 'entry', message: 'no date' },
      { file: 'edges.csv', line: 2, field: 'source', message: 'empty' },
      { file: 'nodes.csv', line: 5, field: 'id', message: 'twice' },
      { file: 'edges.csv', line: 3, message: 'ragged' },
    ];
    const fields = withColumnNames(draftOf({ issues })).map(({ field }) => field);
    expect(fields).toEqual(['seen (entry)', 'from (source)', 'id', undefined]);
    expect(columnFault(draftOf({ issues }), 'nodes', 'entry')).toMatch(/1 problem/);
    expect(columnFault(draftOf({ issues }), 'nodes', 'label')).toBeUndefined();
  });
});
