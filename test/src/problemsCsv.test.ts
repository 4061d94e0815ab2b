import { parse } from 'csv-parse/sync';
import { describe, expect, it } from 'vitest';
import { problemsCsv } from '../../src/components/dataset/problemsCsv';

describe('the list of problems as CSV', () => {
  it('reads back as it was shown, quotes and commas included', () => {
    const text = problemsCsv([
      { file: 'nodes.csv', line: 4, field: 'entry', message: '"twelve", is no number.' },
      { file: 'edges.csv', message: 'The file has no rows.' },
    ]);
    expect(parse(text)).toEqual([
      ['file', 'line', 'column', 'problem'],
      ['nodes.csv', '4', 'entry', '"twelve", is no number.'],
      ['edges.csv', '', '', 'The file has no rows.'],
    ]);
  });

  it('a cell that a spreadsheet would run is led by an apostrophe', () => {
    const text = problemsCsv([{ file: 'nodes.csv', line: 2, field: '=A1', message: '@x' }]);
    expect(parse(text)[1]).toEqual(['nodes.csv', '2', "'=A1", "'@x"]);
  });
});
