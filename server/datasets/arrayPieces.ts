import { encodedPieces, type EncodedPieces } from '../../db/repositories/stagedPieces';
import type { ArrayFile } from '../reading/messages';
import { filePieces } from './filePieces';

/** The array piece by piece; the file must be there until the last is taken. */
export const piecesOf = ({ path, length }: ArrayFile): EncodedPieces =>
  encodedPieces(length, () => filePieces(path));
