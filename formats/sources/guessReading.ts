import { hasDecimalComma, hasDecimalPoint, isDateLike, isMissing, isNumberLike } from './cellKinds';
import { isColumnWord } from './columnWords';
import { recordsOf } from './records';
import type { DecimalMark, Delimiter, Encoding, TextReading } from './types';

/** Records that the guesses look at. */
const SAMPLE = 100;
/** Bytes of the file that they look at. */
const HEAD = 262_144;

/** Candidates; of two that split equally well the earlier is taken. */
const DELIMITERS: readonly Delimiter[] = ['\t', ';', '|', ',', ' '];

/** Guesses delimiter, decimal mark and header from the beginning of a file; what is given is kept. */
export function guessReading(
  bytes: Uint8Array,
  encoding: Encoding,
  given: Partial<TextReading>,
): TextReading {
  const head = headOf(bytes, encoding);
  const delimiter = given.delimiter ?? guessDelimiter(head, encoding);
  const rows = sample(head, encoding, delimiter);
  return {
    encoding,
    delimiter,
    decimal: given.decimal ?? guessDecimal(rows),
    header: given.header ?? guessHeader(rows),
  };
}

/** Whole lines from the start, so that the end of the sample looks like no fault. */
function headOf(bytes: Uint8Array, encoding: Encoding): Uint8Array {
  if (bytes.length <= HEAD) return bytes;
  const head = bytes.subarray(0, HEAD);
  const feed = Math.max(head.lastIndexOf(10), head.lastIndexOf(13));
  if (feed <= 0) return head;
  // A line feed of UTF-16 is two bytes; its zero goes with it.
  const wide = encoding === 'utf-16le' ? 2 : 1;
  return head.subarray(0, feed + wide);
}

/** The first readable records that are no comment. */
function sample(head: Uint8Array, encoding: Encoding, delimiter: Delimiter): (readonly string[])[] {
  const rows: (readonly string[])[] = [];
  let comments = true;
  for (const { cells } of recordsOf(head, { encoding, delimiter, lineCharacters: HEAD })) {
    if (cells === null) continue;
    comments &&= isComment(cells) || declaredDelimiter(cells) !== null;
    if (comments) continue;
    rows.push(cells);
    if (rows.length === SAMPLE) break;
  }
  return rows;
}

/** Lines before the first row that begin with # or % are comments. */
export const isComment = (cells: readonly string[]): boolean => /^[#%]/.test(cells[0] ?? '');

/** The delimiter that a first line like "sep=;" declares for spreadsheet programs. */
export function declaredDelimiter(cells: readonly string[]): Delimiter | null {
  const [, mark] = /^sep=([;,|\t]?)$/i.exec(cells[0] ?? '') ?? [];
  if (mark === undefined || cells.slice(1).some((cell) => cell !== '')) return null;
  return DELIMITERS.find((one) => one === mark) ?? (cells.length > 1 ? ',' : null);
}

function guessDelimiter(head: Uint8Array, encoding: Encoding): Delimiter {
  let best: { delimiter: Delimiter; share: number } = { delimiter: ',', share: 0 };
  for (const delimiter of DELIMITERS) {
    for (const { cells } of recordsOf(head, { encoding, delimiter, lineCharacters: HEAD })) {
      if (cells === null) continue;
      const declared = declaredDelimiter(cells);
      if (declared) return declared;
      break;
    }
    const share = shareOfCommonWidth(sample(head, encoding, delimiter));
    if (share > best.share + 1e-9) best = { delimiter, share };
  }
  return best.delimiter;
}

/** The share of rows that have the commonest number of cells, if that is two or more. */
function shareOfCommonWidth(rows: readonly (readonly string[])[]): number {
  const counts = new Map<number, number>();
  for (const { length } of rows) counts.set(length, (counts.get(length) ?? 0) + 1);
  let most = 0;
  let width = 0;
  for (const [length, count] of counts) {
    if (count > most) [width, most] = [length, count];
  }
  return width >= 2 ? most / rows.length : 0;
}

function guessDecimal(rows: readonly (readonly string[])[]): DecimalMark {
  const cells = rows.flat();
  const commas = cells.filter(hasDecimalComma).length;
  return commas > cells.filter(hasDecimalPoint).length ? ',' : '.';
}

const isData = (cell: string): boolean => isNumberLike(cell) || isDateLike(cell);

/**
 * Whether the first row names the columns: it has a name in use; or it has neither number nor date,
 * and none of its cells comes again below in an edge list's first two columns.
 */
function guessHeader(rows: readonly (readonly string[])[]): boolean {
  const [first, ...rest] = rows;
  if (!first) return true;
  const data = first.filter(isData).length;
  const names = first.filter((cell) => cell.length > 1 && isColumnWord(cell)).length;
  if (names > data || (names > 0 && names >= first.length / 2)) return true;
  if (data > 0) return isMatrixHeader(first, rest);
  if (rest.some((cells) => cells.some((cell, at) => isData(cell) && !isMissing(first[at] ?? ''))))
    return !firstIsRowLike(first, rest);
  const ends = new Set(rest.flatMap((cells) => cells.slice(0, 2)));
  return !first.slice(0, 2).some((cell) => ends.has(cell));
}

/** A row of text over columns of data is a header, unless data columns already hold text below. */
function firstIsRowLike(first: readonly string[], rest: readonly (readonly string[])[]): boolean {
  return first.every(
    (cell, at) => isMissing(cell) || !rest.every((cells) => isData(cells[at] ?? '')),
  );
}

/** Numbered nodes may head a matrix: an empty corner, and the same labels down the first column. */
function isMatrixHeader(first: readonly string[], rest: readonly (readonly string[])[]): boolean {
  const labels = new Set(first.slice(1));
  return (
    first[0] === '' &&
    labels.size === first.length - 1 &&
    rest.every((cells) => labels.has(cells[0] ?? ''))
  );
}
