import { and, eq, sql } from 'drizzle-orm';
import type { Queryable } from '../client';
import { columnMemory } from '../schema/columnMemory';
import type { Scope } from './scope';

/** @returns what was last chosen in the workspace for files with these columns, or null */
export async function findRemembered(
  db: Queryable,
  scope: Scope,
  signature: string,
): Promise<unknown> {
  const [row] = await db
    .select({ choices: columnMemory.choices })
    .from(columnMemory)
    .where(
      and(eq(columnMemory.workspaceId, scope.workspaceId), eq(columnMemory.signature, signature)),
    );
  return row?.choices ?? null;
}

/** Remembers what was chosen, in place of what was before. */
export async function remember(
  db: Queryable,
  { workspaceId, userId }: Scope,
  signature: string,
  choices: object,
): Promise<void> {
  await db
    .insert(columnMemory)
    .values({ workspaceId, signature, choices, updatedBy: userId })
    .onConflictDoUpdate({
      target: [columnMemory.workspaceId, columnMemory.signature],
      set: { choices, updatedBy: userId, updatedAt: sql`now()` },
    });
}
