import { createReadStream } from 'node:fs';

/**
 * Bytes that go to the database in one message: it is copied several times on its way, and while it
 * is, nobody else is answered.
 */
const PIECE = 256 * 1024;

/** The bytes of a file, piece by piece. */
export const filePieces = (path: string): AsyncIterable<Uint8Array> =>
  createReadStream(path, { highWaterMark: PIECE });
