import type { SourceHint } from '#contract/importChoices';
import type { ImportFile } from '#contract/imports';

export const FORMAT_WORDS: Record<NonNullable<ImportFile['format']>, string> = {
  table: 'Table (CSV, TSV)',
  matrix: 'Adjacency matrix',
  graphml: 'GraphML',
  gexf: 'GEXF',
  node_link: 'JSON node-link',
  gml: 'GML',
  pajek: 'Pajek',
};

type Reading = NonNullable<ImportFile['reading']>;

export const ENCODING_WORDS: Record<Reading['encoding'], string> = {
  'utf-8': 'UTF-8',
  'utf-16le': 'UTF-16, low byte first',
  'utf-16be': 'UTF-16, high byte first',
  'windows-1252': 'Windows-1252 (Western European)',
};

export const DELIMITER_WORDS: Record<Reading['delimiter'], string> = {
  ',': 'comma',
  ';': 'semicolon',
  '\t': 'tab',
  '|': 'vertical bar',
  ' ': 'space',
};

export const DECIMAL_WORDS: Record<Reading['decimal'], string> = {
  '.': 'point (1.5)',
  ',': 'comma (1,5)',
};

/** Choices of a select. */
export const optionsOf = <T extends string>(words: Record<T, string>) =>
  (Object.keys(words) as T[]).map((value) => ({ value, label: words[value] }));

/** What is said about a file with one thing more. */
export function withReading(hint: SourceHint, reading: Partial<Reading>): SourceHint {
  return { ...hint, reading: { ...hint.reading, ...reading } };
}
