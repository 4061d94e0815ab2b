import { sql, type AnyColumn, type SQL } from 'drizzle-orm';

/** Whether the dataset of a revision is not deleted: what belongs to a deleted one is not found. */
export const ofKeptDataset = (revisionId: AnyColumn): SQL => sql`not exists (
  select 1 from revisions kept_r join datasets kept_d on kept_d.id = kept_r.dataset_id
  where kept_r.id = ${revisionId} and kept_d.deleted_at is not null)`;
