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
 * bytes that are no text) nothing follows. csv-parse reads the same records from the same text (the
 * tests hold both together); it takes twenty seconds for a pass over 50 MB, and each import makes
 * several.
 */
export function* recordsOf(bytes: Uint8Array, shape: RecordShape): Generator<Found> {
  const { delimiter, lineCharacters } = shape;
  const lines = linesOf(decodedBlocks(bytes, shape.encoding), lineCharacters);
  try {
    for (const first of lines) {
      if (blank(first.text)) continue;
      let scanned = scanLine(first.text, delimiter);
      if (scanned.open) {
        const whole = throughClosing(first, lines, shape);
        if (whole === null) {
          yield { line: first.line, cells: null, message: NEVER_CLOSED };
          return;
        }
        scanned = scanLine(whole, delimiter);
      }
      yield scanned.bad
        ? { line: first.line, cells: null, message: INSIDE }
        : { line: first.line, cells: scanned.cells, message: null };
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
