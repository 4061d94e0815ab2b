import type { SourceFile } from './types';

/** A file whose bytes are not UTF-8 text. */
export class NotText extends Error {
  override readonly name = 'NotText';
  constructor(
    message: string,
    readonly line?: number,
  ) {
    super(message);
  }
}

const AS_UTF8 =
  'Save the file as UTF-8 (“CSV UTF-8” in most spreadsheet programs) and upload it again.';
const LINE_FEED = 10;

/**
 * The text of a file, chunk by chunk, its byte order mark left out.
 * @throws NotText for UTF-16, for bytes that are not UTF-8, and for NUL characters, with the line
 */
export async function* decodeUtf8(file: SourceFile): AsyncGenerator<string> {
  const decoder = new TextDecoder('utf-8', { fatal: true });
  let line = 1;
  let first = true;
  for await (const chunk of file.bytes) {
    if (first) refuseOtherEncodings(chunk);
    first = false;
    const nul = chunk.indexOf(0);
    if (nul >= 0) {
      throw new NotText(
        `There is a NUL character in it, so it is not a text file. ${AS_UTF8}`,
        line + lineFeeds(chunk.subarray(0, nul)),
      );
    }
    yield decodeChunk(decoder, chunk, line);
    line += lineFeeds(chunk);
  }
  yield decodeChunk(decoder, undefined, line);
}

function refuseOtherEncodings(start: Uint8Array): void {
  const [a, b] = start;
  const utf16 = (a === 0xff && b === 0xfe) || (a === 0xfe && b === 0xff);
  if (utf16) throw new NotText(`It is written in UTF-16. ${AS_UTF8}`);
  if (a === 0x1f && b === 0x8b)
    throw new NotText('It is compressed (gzip). Unpack it and upload the CSV file.');
  if (a === 0x50 && b === 0x4b && start[2] === 3) {
    throw new NotText(
      'It is a ZIP archive or a spreadsheet. Save the sheet as CSV and upload that.',
    );
  }
}

function decodeChunk(decoder: TextDecoder, chunk: Uint8Array | undefined, line: number): string {
  try {
    return chunk ? decoder.decode(chunk, { stream: true }) : decoder.decode();
  } catch {
    throw new NotText(
      `It has bytes that are not UTF-8. ${AS_UTF8}`,
      line + (chunk ? goodLines(chunk) : 0),
    );
  }
}

/** Line feeds before the first line of the chunk that is not UTF-8 (the start of a character cut off by the chunk aside). */
function goodLines(chunk: Uint8Array): number {
  let lines = 0;
  for (let from = 0; from < chunk.length;) {
    const end = chunk.indexOf(LINE_FEED, from);
    const piece = chunk.subarray(from, end < 0 ? chunk.length : end);
    try {
      new TextDecoder('utf-8', { fatal: true }).decode(
        from === 0 ? afterContinuation(piece) : piece,
      );
    } catch {
      return lines;
    }
    if (end < 0) return lines;
    lines++;
    from = end + 1;
  }
  return lines;
}

function afterContinuation(bytes: Uint8Array): Uint8Array {
  let from = 0;
  while (from < 3 && ((bytes[from] ?? 0) & 0xc0) === 0x80) from++;
  return bytes.subarray(from);
}

function lineFeeds(bytes: Uint8Array): number {
  let count = 0;
  for (let at = bytes.indexOf(LINE_FEED); at >= 0; at = bytes.indexOf(LINE_FEED, at + 1)) count++;
  return count;
}
