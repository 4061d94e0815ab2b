import { describe, expect, it } from 'vitest';
import type { ImportReport } from '../../server/contract/datasets';
import { importWords } from '../../src/components/dataset/importWords';

const CLEAN: ImportReport = {
  nodeRows: 9,
  edgeRows: 17,
  selfLoops: 0,
  duplicateEdges: 0,
  reversedEdges: 0,
  tiedNodes: 0,
  repeatedLabels: 0,
  isolatedNodes: 0,
  components: 1,
  ignoredColumns: [],
};

describe('what an import found', () => {
  it('says so where nothing was dropped or folded', () => {
    expect(importWords(CLEAN)).toEqual(['Nothing was dropped or folded.']);
  });

  it('counts every kind of dropped edge by itself', () => {
    const words = importWords({ ...CLEAN, selfLoops: 2, duplicateEdges: 1, reversedEdges: 3 });
    expect(words).toEqual([
      '2 self loops dropped.',
      '1 repeated edge dropped.',
      '3 edges repeated with source and target exchanged, dropped.',
    ]);
  });

  it('names the columns that were read past', () => {
    const words = importWords({ ...CLEAN, ignoredColumns: ['nodes.csv: habitat'] });
    expect(words).toEqual(['Columns read past: nodes.csv: habitat.']);
  });

  it('tells of separate components only where there are several', () => {
    expect(importWords({ ...CLEAN, components: 2 })).toEqual(['2 separate components.']);
  });
});
