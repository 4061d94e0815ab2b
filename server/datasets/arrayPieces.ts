import { createReadStream } from 'node:fs';
import { encodedPieces, type EncodedPieces } from '../../db/repositories/stagedPieces';
import type { ArrayFile } from '../reading/messages';

const PIECE = 1024 * 1024;

/** The array piece by piece; the file must be there until the last is taken. */
export const piecesOf = ({ path, length }: ArrayFile): EncodedPieces =>
  encodedPieces(length, () => createReadStream(path, { highWaterMark: PIECE }));
