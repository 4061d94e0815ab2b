import { PREVIEW_ROWS, type RawRow, type RawTable } from './types';

/**
 * A table over rows that are walked anew each time.
 * @param rows gives the same rows at every call
 */
export function tableOf(
  columns: readonly string[],
  rows: () => Iterable<RawRow>,
  where: RawTable['where'],
): RawTable {
  const preview: RawRow[] = [];
  let rowCount = 0;
  for (const row of rows()) {
    if (rowCount < PREVIEW_ROWS) preview.push(row);
    rowCount++;
  }
  return { columns, preview, rowCount, rows, where };
}

/**
 * Names for columns, each once: names are compared in NFC, what is unnamed or stands already is
 * called by its position, 'column 3'.
 */
export function columnNames(written: readonly string[]): string[] {
  const taken = new Set(written.map((name) => name.normalize('NFC')));
  const used = new Set<string>();
  return written.map((name, index) => {
    const key = name.normalize('NFC');
    if (key !== '' && !used.has(key)) {
      used.add(key);
      return name;
    }
    let numbered = `column ${index + 1}`;
    while (used.has(numbered) || (taken.has(numbered) && numbered !== key)) numbered += '′';
    used.add(numbered);
    return numbered;
  });
}
