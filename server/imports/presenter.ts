import {
  importWeights,
  type ImportDraft,
  type ImportEstimate,
  type ImportList,
  type ImportWeights,
} from '#contract/imports';
import type { Cell } from '../../formats/csv';
import type { ImportHead, ImportRow } from '../../db/repositories/imports';
import { draftView } from '../reading/draftView';
import type { Problems } from '../reading/messages';
import type { ImportWithFiles } from './usecases';

const presentHead = ({ createdAt, updatedAt, expiresAt, ...head }: ImportHead) => ({
  id: head.id,
  name: head.name,
  state: head.state,
  datasetId: head.datasetId,
  datasetName: head.datasetName,
  createdAt: createdAt.toISOString(),
  createdBy: head.createdBy,
  updatedAt: updatedAt.toISOString(),
  expiresAt: expiresAt.toISOString(),
});

export const presentImports = (drafts: readonly ImportWithFiles[]): ImportList => ({
  imports: drafts.map(({ head, files }) => ({
    ...presentHead(head),
    files: files.map(({ name, bytes }) => ({ name, bytes })),
  })),
});

/** The signature is for the memory of columns, not for people. */
const shownView = draftView.strip().omit({ signature: true });

export function presentImport(row: ImportRow, estimate: ImportEstimate): ImportDraft {
  const view = shownView.parse(row.view);
  const { datasetId, revisionId } = row;
  return {
    ...presentHead(row),
    version: row.version,
    ...view,
    estimate,
    saved: datasetId !== null && revisionId !== null ? { datasetId, revisionId } : null,
  };
}

export const presentWeights = ({ weights }: ImportRow): ImportWeights =>
  importWeights.parse({ weights });

export const PROBLEMS_HEADER = ['file', 'line', 'column', 'problem'];

/** One row a problem; where some were not even listed, the last row says how many. */
export function* problemRows({ issues, leftOut }: Problems): Generator<Cell[]> {
  for (const { file, line, field, message } of issues) {
    yield [file ?? null, line ?? null, field ?? null, message];
  }
  if (leftOut > 0) yield [null, null, null, `There are ${leftOut} more problems.`];
}
