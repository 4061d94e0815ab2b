import { createHash } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import type { RunPart } from '#contract/enums';
import type { Queryable } from '../client';
import { revisionNodes } from '../schema/index';

export type { RunPart };

/** What of a node a part is told by; in the entry unit of the revision. */
export interface StoredNode {
  readonly entry: number;
  readonly earliest: number | null;
  readonly latest: number | null;
}

/** Worker side: @returns the nodes of a revision in row order; none if it is gone. */
export async function readIntervals(
  db: Queryable,
  workspaceId: string,
  revisionId: string,
): Promise<StoredNode[]> {
  const { entry, earliest, latest } = revisionNodes;
  return db
    .select({ entry, earliest, latest })
    .from(revisionNodes)
    .where(
      and(eq(revisionNodes.workspaceId, workspaceId), eq(revisionNodes.revisionId, revisionId)),
    )
    .orderBy(revisionNodes.row);
}

const ascending = (a: number, b: number): number => a - b;

/** Lists ascending, each once, a pair's lower row first: equal parts are then written alike. */
export function canonicalPart(part: RunPart): RunPart {
  if (part.kind !== 'chosen') return part;
  const tuples = (list: readonly (readonly [number, number])[]): [number, number][] =>
    [...new Map(list.map(([a, b]) => [`${a} ${b}`, [a, b] as [number, number]])).values()].sort(
      (x, y) => x[0] - y[0] || x[1] - y[1],
    );
  return {
    kind: 'chosen',
    windows: tuples(part.windows),
    nodes: [...new Set(part.nodes)].sort(ascending),
    pairs: tuples(part.pairs.map(([a, b]) => [Math.min(a, b), Math.max(a, b)] as const)),
  };
}

/** @returns a name of the part, at most 80 characters. @param part canonical */
export function partKey(part: RunPart): string {
  switch (part.kind) {
    case 'whole':
    case 'overlapping':
      return part.kind;
    case 'within':
      return `within ${part.positions}`;
    case 'chosen':
      return `chosen ${createHash('sha256').update(JSON.stringify(part)).digest('hex')}`;
  }
}
