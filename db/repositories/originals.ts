import { and, asc, eq } from 'drizzle-orm';
import type { Queryable } from '../client';
import { importFiles, imports } from '../schema/imports';
import type { Scope } from './scope';

/** The files of the import that a revision came of, in the order sent; none where it came otherwise. */
export async function listOriginals(db: Queryable, scope: Scope, revisionId: string) {
  return db
    .select({
      importId: importFiles.importId,
      position: importFiles.position,
      name: importFiles.name,
      bytes: importFiles.bytes,
      pasted: importFiles.pasted,
    })
    .from(importFiles)
    .innerJoin(
      imports,
      and(eq(imports.workspaceId, importFiles.workspaceId), eq(imports.id, importFiles.importId)),
    )
    .where(and(eq(imports.workspaceId, scope.workspaceId), eq(imports.revisionId, revisionId)))
    .orderBy(asc(importFiles.position));
}
export type Original = Awaited<ReturnType<typeof listOriginals>>[number];
