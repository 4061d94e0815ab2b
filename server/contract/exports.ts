import { z } from 'zod';

/** What a revision is written as: two tables, or one file. */
export const EXPORT_KINDS = ['nodes_csv', 'edges_csv', 'graphml', 'node_link'] as const;
export const exportKind = z.enum(EXPORT_KINDS);
export type ExportKind = z.infer<typeof exportKind>;

/** GET …/revisions/:revisionId/originals: the files that a revision came from, as they were sent. */
export const originalFiles = z.strictObject({
  files: z.array(
    z.strictObject({
      /** Counts from 0; names the file in its address. */
      position: z.number().int().nonnegative(),
      name: z.string(),
      bytes: z.number().int().nonnegative(),
      /** Pasted as text instead of sent as a file. */
      pasted: z.boolean(),
    }),
  ),
});
export type OriginalFiles = z.infer<typeof originalFiles>;
