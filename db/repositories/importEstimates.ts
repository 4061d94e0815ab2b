import { and, eq, isNull, sql } from 'drizzle-orm';
import type { Db, Queryable } from '../client';
import { importEstimates } from '../schema/importEstimates';
import { addToOutbox } from './outbox';
import type { Scope } from './scope';
import { removeStaged, staged, type EncodedPieces } from './stagedPieces';

/** Which estimate: the network of one version of a draft. */
export interface ImportQuestion {
  readonly importId: string;
  readonly version: number;
}

/** f64[n] entries in node row order, and u32[2 m] edges as in revisions.edges. */
export interface DraftArrays {
  readonly entries: EncodedPieces;
  readonly edges: EncodedPieces;
}

/** Puts the question about the newest version in place of any before; give a transaction. */
export async function askImportEstimate(
  db: Queryable,
  { workspaceId }: Scope,
  { importId, version }: ImportQuestion,
  arrays: DraftArrays,
): Promise<void> {
  const set = {
    version,
    entries: await staged(db, arrays.entries),
    edges: await staged(db, arrays.edges),
    estimate: null,
    failure: null,
    tries: 0,
    dispatchedAt: sql`now()`,
  };
  await db
    .insert(importEstimates)
    .values({ workspaceId, importId, ...set })
    .onConflictDoUpdate({ target: importEstimates.importId, set });
  for (const array of [arrays.entries, arrays.edges]) await removeStaged(db, array);
  await addToOutbox(db, workspaceId, {
    kind: 'import_estimate',
    payload: { importId, version },
  });
}

/** Forgets the network of a draft that has none any more. */
export async function dropImportEstimate(
  db: Queryable,
  { workspaceId }: Scope,
  importId: string,
): Promise<void> {
  await db
    .delete(importEstimates)
    .where(
      and(eq(importEstimates.workspaceId, workspaceId), eq(importEstimates.importId, importId)),
    );
}

/** @returns what is known, both null while a worker is waited for; null if nothing was asked */
export async function findImportEstimate(db: Queryable, { workspaceId }: Scope, importId: string) {
  const [row] = await db
    .select({ estimate: importEstimates.estimate, failure: importEstimates.failure })
    .from(importEstimates)
    .where(
      and(eq(importEstimates.workspaceId, workspaceId), eq(importEstimates.importId, importId)),
    );
  return row ?? null;
}

/** Worker side: @returns the network and how often it was begun, now included; null if it is answered or replaced. */
export async function claimImportEstimate(db: Db, question: ImportQuestion) {
  const [row] = await db
    .update(importEstimates)
    .set({ tries: sql`${importEstimates.tries} + 1`, dispatchedAt: sql`now()` })
    .where(unanswered(question))
    .returning({
      entries: importEstimates.entries,
      edges: importEstimates.edges,
      tries: importEstimates.tries,
    });
  return row ?? null;
}

/** Worker side: stores the first answer to the newest version. */
export async function answerImportEstimate(
  db: Db,
  question: ImportQuestion,
  answer: { readonly estimate: object } | { readonly failure: string },
): Promise<void> {
  await db.update(importEstimates).set(answer).where(unanswered(question));
}

const unanswered = ({ importId, version }: ImportQuestion) =>
  and(
    eq(importEstimates.importId, importId),
    eq(importEstimates.version, version),
    isNull(importEstimates.estimate),
    isNull(importEstimates.failure),
  );

/** Asks again for estimates whose job was lost. */
export async function redispatchImportEstimates(db: Db, seconds: number): Promise<void> {
  await db.execute(sql`
    with late as (
      update import_estimates e set dispatched_at = now()
      where estimate is null and failure is null
        and dispatched_at < now() - make_interval(secs => ${seconds})
        and not exists (
          select 1 from outbox o
          where o.kind = 'import_estimate' and o.payload->>'importId' = e.import_id::text
        )
      returning workspace_id, import_id, version
    ), asked as (
      insert into outbox (kind, workspace_id, payload)
      select 'import_estimate', workspace_id,
        jsonb_build_object('importId', import_id, 'version', version) from late
      returning 1
    )
    select pg_notify('outbox_added', '') from asked`);
}
