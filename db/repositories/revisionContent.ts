import { and, desc, eq, lt } from 'drizzle-orm';
import type { Queryable } from '../client';
import { decodeFloat64 } from '../codecs/typedArrays';
import { revisions } from '../schema/revisions';
import type { Scope } from './scope';

/** Id of the revision before this number in a dataset, or null for the first. */
export async function findRevisionBefore(
  db: Queryable,
  scope: Scope,
  { datasetId, number }: { readonly datasetId: string; readonly number: number },
): Promise<string | null> {
  const rows = await db
    .select({ id: revisions.id })
    .from(revisions)
    .where(
      and(
        eq(revisions.workspaceId, scope.workspaceId),
        eq(revisions.datasetId, datasetId),
        lt(revisions.number, number),
      ),
    )
    .orderBy(desc(revisions.number))
    .limit(1);
  return rows[0]?.id ?? null;
}

/** f64[m]: the weight of each edge, NaN for none; null where the revision has none or is not there. */
export async function findWeights(
  db: Queryable,
  scope: Scope,
  revisionId: string,
): Promise<Float64Array | null> {
  const rows = await db
    .select({ weights: revisions.weights })
    .from(revisions)
    .where(and(eq(revisions.workspaceId, scope.workspaceId), eq(revisions.id, revisionId)));
  const stored = rows[0]?.weights ?? null;
  return stored && decodeFloat64(stored);
}
