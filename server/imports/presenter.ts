import {
  importEstimate,
  importWeights,
  type ImportDraft,
  type ImportEstimate,
  type ImportList,
  type ImportWeights,
} from '#contract/imports';
import type { Cell } from '../../formats/csv';
import type { findImportEstimate } from '../../db/repositories/importEstimates';
import type { ImportHead, ImportRow } from '../../db/repositories/imports';
import { draftView } from '../reading/draftView';
import type { Problems } from '../reading/messages';
import type { ImportWithFiles } from './usecases';

type StoredEstimate = Awaited<ReturnType<typeof findImportEstimate>>;

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

const storedEstimate = importEstimate.options[3].omit({ state: true });

function presentEstimate(stored: StoredEstimate): ImportEstimate {
  if (stored === null) return { state: 'none' };
  const { estimate, failure } = stored;
  if (failure !== null) return { state: 'failed', message: failure };
  if (estimate === null) return { state: 'waiting' };
  return { state: 'ready', ...storedEstimate.parse(estimate) };
}

/** @param stored what a worker said, or that it is asked */
export function presentImport(row: ImportRow, stored: StoredEstimate): ImportDraft {
  const view = shownView.parse(row.view);
  const { datasetId, revisionId } = row;
  return {
    ...presentHead(row),
    version: row.version,
    ...view,
    estimate: presentEstimate(stored),
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
