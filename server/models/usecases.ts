import type { GrowDatasetRequest } from '#contract/models';
import type { Db } from '../../db/client';
import type { Scope } from '../../db/repositories/scope';
import { refusalsOf } from '../../models/index';
import { networkFrom } from '../datasets/readNetwork';
import type { UploadFolder } from '../datasets/upload';
import { createDataset } from '../datasets/usecases';
import { invalid } from '../http/parse';
import type { Reader } from '../reading/reader';

export interface Growing {
  readonly db: Db;
  readonly reader: Reader;
  /** Where the grown texts lie while they are read. */
  readonly uploads: UploadFolder;
}

/**
 * Grows a network and saves it as a new invented dataset. @returns its id
 * @throws Failure `request.invalid` by field, or past a limit of reading
 */
export async function growDataset(
  { db, reader, uploads }: Growing,
  scope: Scope,
  { name, ...growth }: GrowDatasetRequest,
): Promise<string> {
  const refusals = refusalsOf(growth);
  if (refusals.length > 0) throw invalid(refusals);
  return uploads.within(async (folder) => {
    const { network, description } = await reader.grow({ folder, growth });
    const fields = { name, description, invented: true };
    return createDataset(db, scope, fields, networkFrom(network));
  });
}
