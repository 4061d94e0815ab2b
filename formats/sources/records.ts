import { CsvError, parse } from 'csv-parse/sync';
import { NotText } from '../text';
import { decodedBlocks } from './decoding';
import { linesOf, TooLong, type SourceLine } from './lines';
import { scanLine } from './scanLine';
import type { Delimiter, Encoding } from './types';

/** One record of a delimited file: its cells, or what is wrong with it. */
export type Found =
  | { readonly line: number; readonly cells: readonly string[]; readonly message: null }
  | { readonly line: number | undefined; readonly cells: null; readonly message: string };

export interface RecordShape {
  readonly encoding: Encoding;
  readonly delimiter: Delimiter;
  /** Longest line or record, in characters. */
  readonly lineCharacters: number;
}

/**
 * Every record in the order of the file, blank lines left out. A record that cannot be read is
 * given as its message; after one that cannot be ended (a quote never closed, a line too long,
 * bytes that are no text) nothing follows. A line without trouble is split here; cells over several
 * lines are read, and misplaced quotes judged, by csv-parse.
 */
export function* recordsOf(bytes: Uint8Array, shape: RecordShape): Generator<Found> {
  const { delimiter, lineCharacters } = shape;
  const lines = linesOf(decodedBlocks(bytes, shape.encoding), lineCharacters);
  try {
    for (const first of lines) {
      if (blank(first.text)) continue;
      const { cells, open, bad } = scanLine(first.text, delimiter);
      if (!open && !bad) yield { line: first.line, cells, message: null };
      else if (bad) yield byCsvParse(first.line, first.text, delimiter);
      else {
        const whole = throughClosing(first, lines, shape);
        if (whole === null) {
          yield { line: first.line, cells: null, message: NEVER_CLOSED };
          return;
        }
        yield byCsvParse(first.line, whole, delimiter);
      }
    }
  } catch (error) {
    if (error instanceof TooLong)
      yield { line: error.line, cells: null, message: tooLong(lineCharacters) };
    else if (error instanceof NotText)
      yield { line: error.line, cells: null, message: error.message };
    else throw error;
  }
}

const NEVER_CLOSED =
  'A double quote is opened and never closed. Close it, or double it ("") where it belongs to the text.';
const INSIDE =
  'A double quote stands inside a cell. Put the whole cell in double quotes and double the quote ("").';

const tooLong = (most: number) =>
  `A row is longer than ${most} characters. Look for a quote that is not closed, or for missing line ends.`;

const blank = (text: string): boolean => text === '' || /^[ \f\v]*$/.test(text);

/** The text of a record whose quoted cell goes on over lines, or null if the file ends within it. */
function throughClosing(
  first: SourceLine,
  lines: Iterator<SourceLine>,
  { delimiter, lineCharacters }: RecordShape,
): string | null {
  const pieces = [first.text, first.end];
  let length = first.text.length;
  for (let next = lines.next(); !next.done; next = lines.next()) {
    const { text, end } = next.value;
    pieces.push(text);
    length += text.length + 1;
    if (length > lineCharacters) throw new TooLong(first.line);
    if (!scanLine(text, delimiter, 'inside').open) return pieces.join('');
    pieces.push(end);
  }
  return null;
}

function byCsvParse(line: number, text: string, delimiter: Delimiter): Found {
  try {
    const records: string[][] = parse(text, {
      delimiter: delimiter === ' ' ? [' ', '\t'] : delimiter,
      trim: delimiter !== ' ' && delimiter !== '\t',
      relax_column_count: true,
      record_delimiter: ['\r\n', '\n', '\r'],
    });
    const [cells] = records;
    if (!cells || records.length > 1) return { line, cells: null, message: INSIDE };
    return {
      line,
      cells: delimiter === ' ' ? cells.filter((cell) => cell !== '') : cells,
      message: null,
    };
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    return { line, cells: null, message: csvSentence(error) };
  }
}

function csvSentence({ code }: CsvError): string {
  switch (code) {
    case 'CSV_QUOTE_NOT_CLOSED':
      return NEVER_CLOSED;
    case 'CSV_INVALID_CLOSING_QUOTE':
    case 'INVALID_OPENING_QUOTE':
      return INSIDE;
    default:
      return `The row cannot be read as delimited values (${code}). Save the table as CSV again.`;
  }
}
