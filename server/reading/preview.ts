import { PREVIEW_ROWS, type ImportFile, type ImportTable } from '#contract/imports';
import type { RawSource, RawTable } from '../../formats/sources/types';
import type { DraftFile } from './messages';

/** Characters of a cell that is shown. */
const CELL = 300;

/** @returns the text, cut after so many characters where it is longer. */
export function clipped(text: string, most: number): string {
  if (text.length <= most) return text;
  // A cut may not leave half of a surrogate pair.
  return `${text.slice(0, most).replace(/[\ud800-\udbff]$/, '')}…`;
}

const shownTable = (table: RawTable | null): ImportTable | null =>
  table && {
    columns: [...table.columns],
    preview: table.preview.slice(0, PREVIEW_ROWS).map(({ line, cells }) => ({
      line,
      cells: cells.map((cell) => clipped(cell, CELL)),
    })),
    rowCount: table.rowCount,
    where: table.where,
  };

/** A file as it was read. */
export const shownFile = (
  { name, bytes, pasted, hint }: Omit<DraftFile, 'path'>,
  position: number,
  source: RawSource,
): ImportFile => ({
  position,
  name,
  bytes,
  pasted,
  hint,
  format: source.format,
  reading: source.reading,
  nodes: shownTable(source.nodes),
  edges: shownTable(source.edges),
  directed: source.directed,
  dropped: source.dropped.map(({ what, count }) => ({ what, count })),
  notes: [...source.notes],
});

/** A file that was not read to an end. */
export const unreadFile = (
  { name, bytes, pasted, hint }: Omit<DraftFile, 'path'>,
  position: number,
): ImportFile => ({
  position,
  name,
  bytes,
  pasted,
  hint,
  format: null,
  reading: null,
  nodes: null,
  edges: null,
  directed: false,
  dropped: [],
  notes: [],
});
