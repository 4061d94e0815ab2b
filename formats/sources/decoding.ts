import { NotText } from '../text';
import type { Encoding, SourceBytes } from './types';

/** Bytes decoded at a time; the pieces of lines cut from them stay small. */
const BLOCK = 65_536;
/** Bytes looked at for UTF-16 without a byte order mark. */
const HEAD = 4_096;

/** How the bytes of a file are to be read as text. */
export interface EncodingGuess {
  readonly encoding: Encoding;
  /** Why, where it is not plain UTF-8; else null. */
  readonly note: string | null;
}

/** Guesses by byte order mark, by the zeros of UTF-16, by validity as UTF-8; windows-1252 is what is left. */
export function guessEncoding(bytes: Uint8Array): EncodingGuess {
  const marked = byteOrderMark(bytes);
  if (marked === 'utf-8') return { encoding: marked, note: null };
  if (marked) return { encoding: marked, note: `The file is read as ${WORDS[marked]}.` };
  const zeros = utf16ByZeros(bytes);
  if (zeros) {
    return {
      encoding: zeros,
      note: `The file has no byte order mark; by its zero bytes it is read as ${WORDS[zeros]}.`,
    };
  }
  if (declaredWestern(bytes) && !isUtf8(bytes)) {
    return { encoding: 'windows-1252', note: 'The file says that it is Western (windows-1252).' };
  }
  if (isUtf8(bytes)) return { encoding: 'utf-8', note: null };
  return {
    encoding: 'windows-1252',
    note: 'The file is not UTF-8, so it is read as Western (windows-1252). Check the letters with accents.',
  };
}

const WORDS: Readonly<Record<Encoding, string>> = {
  'utf-8': 'UTF-8',
  'utf-16le': 'UTF-16, little-endian',
  'utf-16be': 'UTF-16, big-endian',
  'windows-1252': 'Western (windows-1252)',
};

function byteOrderMark([a, b, c]: Uint8Array): Encoding | null {
  if (a === 0xef && b === 0xbb && c === 0xbf) return 'utf-8';
  if (a === 0xff && b === 0xfe) return 'utf-16le';
  if (a === 0xfe && b === 0xff) return 'utf-16be';
  return null;
}

/** UTF-16 of mostly Western text has a zero in nearly every second byte, and none in the others. */
function utf16ByZeros(bytes: Uint8Array): Encoding | null {
  const head = bytes.subarray(0, HEAD);
  if (head.length < 4) return null;
  const zeros: [number, number] = [0, 0];
  head.forEach((byte, at) => {
    if (byte === 0) zeros[at % 2 === 0 ? 0 : 1]++;
  });
  const [even, odd] = zeros;
  const most = head.length * 0.3;
  if (odd > most && even === 0) return 'utf-16le';
  if (even > most && odd === 0) return 'utf-16be';
  return null;
}

/** An XML declaration that names ISO-8859-1, ISO-8859-15 or windows-1252. */
function declaredWestern(bytes: Uint8Array): boolean {
  const head = Buffer.from(bytes.subarray(0, 200)).toString('latin1');
  return /^\s*<\?xml[^>]*encoding=["'](?:iso-8859-15?|windows-1252|latin1)["']/i.test(head);
}

function isUtf8(bytes: Uint8Array): boolean {
  const decoder = new TextDecoder('utf-8', { fatal: true });
  try {
    for (let at = 0; at < bytes.length; at += BLOCK)
      decoder.decode(bytes.subarray(at, at + BLOCK), { stream: true });
    decoder.decode();
    return true;
  } catch {
    return false;
  }
}

/**
 * The text of a file in blocks, its byte order mark left out.
 * @throws NotText with the line where the bytes are no text in this encoding (NUL, lone surrogates)
 */
export function* decodedBlocks(bytes: Uint8Array, encoding: Encoding): Generator<string> {
  const decode = decoderOf(encoding);
  let line = 1;
  let carriageReturn = false;
  for (let at = 0; at < bytes.length; at += BLOCK) {
    const end = at + BLOCK;
    const { text, wrong } = decode(bytes.subarray(at, end), end >= bytes.length);
    const nul = text.indexOf('\0');
    if (wrong !== null || nul >= 0) {
      const first = wrong !== null && (nul < 0 || wrong < nul) ? wrong : nul;
      const before = lineEnds(text.slice(0, first), carriageReturn);
      throw new NotText(wrong === first ? wrongBytes(encoding) : NUL, line + before.count);
    }
    const ends = lineEnds(text, carriageReturn);
    line += ends.count;
    carriageReturn = ends.carriageReturn;
    if (text !== '') yield text;
  }
}

/** @throws NotText */
export function decodedText({ bytes }: SourceBytes, encoding: Encoding): string {
  return [...decodedBlocks(bytes, encoding)].join('');
}

const NUL =
  'There is a NUL character in it, so this is not plain text. Save the file as text (UTF-8) again.';

function wrongBytes(encoding: Encoding): string {
  return encoding === 'windows-1252'
    ? 'It has bytes that mean nothing in Western text (windows-1252). Choose another encoding, or save the file as UTF-8.'
    : `It has bytes that are not ${WORDS[encoding]}${encoding === 'utf-8' ? '' : ' (half of a character, a lone surrogate)'}. Choose another encoding, or save the file as UTF-8.`;
}

/** Text of one block and the index of the first character that has no meaning, or null. */
type Decode = (block: Uint8Array, last: boolean) => { text: string; wrong: number | null };

function decoderOf(encoding: Encoding): Decode {
  if (encoding === 'windows-1252') return decodeWestern;
  const fatal = new TextDecoder(encoding, { fatal: true });
  // Follows the other, so that the place of a wrong character can be told.
  const lenient = new TextDecoder(encoding);
  return (block, last) => {
    const text = lenient.decode(block, { stream: !last });
    try {
      return { text: fatal.decode(block, { stream: !last }), wrong: null };
    } catch {
      return { text, wrong: Math.max(0, text.indexOf('\uFFFD')) };
    }
  };
}

/** 0x80–0x9F of windows-1252 (WHATWG index); five of them are not assigned. */
const WESTERN =
  '\u20AC\0\u201A\u0192\u201E\u2026\u2020\u2021\u02C6\u2030\u0160\u2039\u0152\0\u017D\0' +
  '\0\u2018\u2019\u201C\u201D\u2022\u2013\u2014\u02DC\u2122\u0161\u203A\u0153\0\u017E\u0178';
const HIGH_CONTROLS = new RegExp('[\\u0080-\\u009f]', 'g');

// Node's own decoder reads 0x80–0x9F as control characters (seen in 20.20).
function decodeWestern(block: Uint8Array): { text: string; wrong: number | null } {
  let wrong: number | null = null;
  const latin = Buffer.from(block.buffer, block.byteOffset, block.length).toString('latin1');
  const text = latin.replace(HIGH_CONTROLS, (letter, at: number) => {
    const meant = WESTERN[letter.charCodeAt(0) - 0x80] ?? '\0';
    if (meant !== '\0') return meant;
    wrong ??= at;
    return '\uFFFD';
  });
  return { text, wrong };
}

/** Line ends (LF, CRLF, CR) in a stretch that may follow a carriage return. */
function lineEnds(
  text: string,
  afterCarriageReturn: boolean,
): { count: number; carriageReturn: boolean } {
  let count = text.match(/\r\n|\n|\r/g)?.length ?? 0;
  if (afterCarriageReturn && text.startsWith('\n')) count--;
  return { count, carriageReturn: text.endsWith('\r') };
}
