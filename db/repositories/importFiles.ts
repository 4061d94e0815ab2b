import { and, asc, eq, inArray } from 'drizzle-orm';
import type { Queryable } from '../client';
import { importFiles, importPieces } from '../schema/imports';
import type { Scope } from './scope';

export interface NewImportFile {
  readonly position: number;
  /** Each once in an import. */
  readonly name: string;
  readonly bytes: number;
  readonly pasted: boolean;
}

/** Stores a file piece by piece; give a transaction. */
export async function insertImportFile(
  db: Queryable,
  { workspaceId }: Scope,
  importId: string,
  file: NewImportFile,
  pieces: AsyncIterable<Uint8Array> | Iterable<Uint8Array>,
): Promise<void> {
  const { position } = file;
  await db.insert(importFiles).values({ ...file, workspaceId, importId });
  let piece = 0;
  for await (const content of pieces) {
    await db
      .insert(importPieces)
      .values({ workspaceId, importId, position, piece: piece++, content });
  }
}

/** The files of these imports without their bytes, in the order sent. */
export async function listImportFiles(db: Queryable, scope: Scope, importIds: readonly string[]) {
  if (importIds.length === 0) return [];
  return db
    .select({
      importId: importFiles.importId,
      position: importFiles.position,
      name: importFiles.name,
      bytes: importFiles.bytes,
      pasted: importFiles.pasted,
      hint: importFiles.hint,
    })
    .from(importFiles)
    .where(
      and(
        eq(importFiles.workspaceId, scope.workspaceId),
        inArray(importFiles.importId, [...importIds]),
      ),
    )
    .orderBy(asc(importFiles.position));
}
export type ImportFileRow = Awaited<ReturnType<typeof listImportFiles>>[number];

/** The bytes of a file, one piece at a time. */
export async function* importPiecesOf(
  db: Queryable,
  scope: Scope,
  importId: string,
  position: number,
): AsyncGenerator<Uint8Array> {
  for (let piece = 0; ; piece++) {
    const [row] = await db
      .select({ content: importPieces.content })
      .from(importPieces)
      .where(
        and(
          eq(importPieces.workspaceId, scope.workspaceId),
          eq(importPieces.importId, importId),
          eq(importPieces.position, position),
          eq(importPieces.piece, piece),
        ),
      );
    if (row === undefined) return;
    yield row.content;
  }
}

/** Sets how a file is to be read. @returns false where there is no such file */
export async function changeHint(
  db: Queryable,
  scope: Scope,
  importId: string,
  position: number,
  hint: object,
): Promise<boolean> {
  const rows = await db
    .update(importFiles)
    .set({ hint })
    .where(
      and(
        eq(importFiles.workspaceId, scope.workspaceId),
        eq(importFiles.importId, importId),
        eq(importFiles.position, position),
      ),
    )
    .returning({ position: importFiles.position });
  return rows.length === 1;
}
