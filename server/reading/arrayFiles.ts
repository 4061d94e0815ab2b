import { randomUUID } from 'node:crypto';
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { encodeArrays, type StoredArray } from '../../db/codecs/typedArrays';
import type { ArrayFile } from './messages';

/** Writes the bytes that the database will hold. */
export function writeArray(folder: string, array: StoredArray): ArrayFile {
  const path = join(folder, randomUUID());
  writeFileSync(path, encodeArrays([array]), { mode: 0o600 });
  return { path, length: array.length };
}
