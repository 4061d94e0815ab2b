import { randomUUID } from 'node:crypto';
import { createReadStream, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { encodeArrays, type StoredArray } from '../../db/codecs/typedArrays';
import { encodedPieces, type EncodedPieces } from '../../db/repositories/stagedPieces';
import type { ArrayFile } from './messages';

const PIECE = 1024 * 1024;

/** Writes the bytes that the database will hold. */
export function writeArray(folder: string, array: StoredArray): ArrayFile {
  const path = join(folder, randomUUID());
  writeFileSync(path, encodeArrays([array]), { mode: 0o600 });
  return { path, length: array.length };
}

/** The array piece by piece; the file must be there until the last is taken. */
export const piecesOf = ({ path, length }: ArrayFile): EncodedPieces =>
  encodedPieces(length, () => createReadStream(path, { highWaterMark: PIECE }));
