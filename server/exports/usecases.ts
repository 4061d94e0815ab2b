import type { ExportKind } from '#contract/exports';
import type { Db } from '../../db/client';
import { findDataset } from '../../db/repositories/datasets';
import { importPiecesOf } from '../../db/repositories/importFiles';
import { listOriginals, type Original } from '../../db/repositories/originals';
import { findRevision } from '../../db/repositories/revisions';
import type { Scope } from '../../db/repositories/scope';
import { exportPieces } from '../../formats/writers/exportNetwork';
import { UnwritableText } from '../../formats/writers/xmlText';
import { notFound } from '../http/parse';
import { contentOf } from '../revisions/content';
import { unwritable } from './errors';

export interface Download {
  /** Without its ending. */
  readonly name: string;
  readonly pieces: Iterable<string> | AsyncIterable<Uint8Array>;
}

/**
 * A revision as it was understood, in one of the written formats; read again, it has the same content
 * hash.
 * @throws Failure `revisions.not_found`; `revisions.unwritable` where the format cannot hold a text
 */
export async function understood(
  db: Db,
  scope: Scope,
  revisionId: string,
  kind: ExportKind,
): Promise<Download> {
  const content = await contentOf(db, scope, revisionId);
  const dataset = await findDataset(db, scope, content.datasetId);
  if (dataset === null) throw notFound('revisions');
  const { nodes, edges, weights, entryUnit } = content;
  try {
    const pieces = exportPieces(kind, { nodes, edges, weights, entryUnit });
    return { name: `${dataset.name} revision ${content.number}`, pieces: begun(pieces) };
  } catch (error) {
    if (error instanceof UnwritableText) throw unwritable(error);
    throw error;
  }
}

/** Takes the first piece at once: what cannot be written is told before anything is sent. */
function* restOf(first: string, rest: Iterator<string>): Generator<string> {
  yield first;
  for (let next = rest.next(); next.done !== true; next = rest.next()) yield next.value;
}
function begun(pieces: Iterable<string>): Iterable<string> {
  const iterator = pieces[Symbol.iterator]();
  const first = iterator.next();
  return first.done === true ? [] : restOf(first.value, iterator);
}

/** @throws Failure `revisions.not_found` */
export async function originalsOf(
  db: Db,
  scope: Scope,
  revisionId: string,
): Promise<readonly Original[]> {
  if ((await findRevision(db, scope, revisionId)) === null) throw notFound('revisions');
  return listOriginals(db, scope, revisionId);
}

/** A file as it came in, byte for byte. @throws Failure 404 where there is no such file */
export async function original(
  db: Db,
  scope: Scope,
  revisionId: string,
  position: number,
): Promise<Download> {
  const files = await originalsOf(db, scope, revisionId);
  const file = files.find((one) => one.position === position);
  if (file === undefined) throw notFound('files');
  return { name: file.name, pieces: importPiecesOf(db, scope, file.importId, position) };
}
