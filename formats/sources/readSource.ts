import { NotText } from '../text';
import { decodedBlocks, decodedText, guessEncoding } from './decoding';
import { detectFormat } from './detectFormat';
import { GRAPH_READERS } from './graphReaders';
import { guessReading } from './guessReading';
import { refusalOf } from './refusals';
import { emptySource, tableSource } from './tableSource';
import type {
  Encoding,
  GraphFormat,
  RawSource,
  SourceBytes,
  SourceHint,
  SourceLimits,
  TextReading,
} from './types';

/**
 * Reads a file of any known format. How it is read is guessed where the hint says nothing: the
 * encoding by its bytes, the format by its content and then by its name, delimiter, decimal mark and
 * header by the first rows. What is wrong is among the issues of the source; nothing is thrown for a
 * bad file.
 */
export async function readSource(
  file: SourceBytes,
  hint: SourceHint,
  limits: SourceLimits,
): Promise<RawSource> {
  const { encoding, note } = hint.reading?.encoding
    ? { encoding: hint.reading.encoding, note: null }
    : guessEncoding(file.bytes);
  const refusal = sizeRefusal(file, limits) ?? refusalOf(file.bytes);
  if (refusal !== null) return refused(file.name, encoding, refusal);
  const format = hint.format ?? detectFormat(headText(file.bytes, encoding), file.name) ?? 'table';
  const source =
    format === 'table' || format === 'matrix'
      ? tableSource(file, guessReading(file.bytes, encoding, hint.reading ?? {}), hint, limits)
      : await graphSource(file, format, encoding, limits);
  return note === null ? source : { ...source, notes: [note, ...source.notes] };
}

/** Marks of a graph file, where delimiter and header say nothing. */
const graphReading = (encoding: Encoding): TextReading => ({
  encoding,
  delimiter: ',',
  decimal: '.',
  header: true,
});

function sizeRefusal({ bytes }: SourceBytes, limits: SourceLimits): string | null {
  return bytes.length > limits.bytes
    ? `It has ${bytes.length} bytes; at most ${limits.bytes} are read. Leave the weaker edges out.`
    : null;
}

function refused(file: string, encoding: Encoding, message: string, line?: number): RawSource {
  return {
    ...emptySource(file, graphReading(encoding)),
    issues: [{ file, message, ...(line === undefined ? {} : { line }) }],
  };
}

/** The first characters; what is wrong with them is told by the reader. */
function headText(bytes: Uint8Array, encoding: Encoding): string {
  try {
    for (const block of decodedBlocks(bytes, encoding)) return block.slice(0, 20_000);
    return '';
  } catch (error) {
    if (error instanceof NotText) return '';
    throw error;
  }
}

async function graphSource(
  file: SourceBytes,
  format: GraphFormat,
  encoding: Encoding,
  limits: SourceLimits,
): Promise<RawSource> {
  const reader = GRAPH_READERS[format];
  try {
    const text = decodedText(file, encoding);
    return await reader({ name: file.name, text, encoding }, limits);
  } catch (error) {
    if (error instanceof NotText) return refused(file.name, encoding, error.message, error.line);
    throw error;
  }
}
