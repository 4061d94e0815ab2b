import { decodeMatrixBlock, type MatrixBlock } from '#contract/matrixBytes';
import {
  pairDetail,
  recordedBarcode,
  run,
  runEstimate,
  type CreateRunRequest,
  type PairDetail,
  type RecordedBarcode,
  type Run,
  type RunEstimate,
} from '#contract/runs';
import { inWorkspace, requestBytes, requestJson } from './client';

/**
 * @param idempotencyKey any text up to 200 characters; a repeat with the same key answers the same
 *   run, so a doubled click starts one.
 */
export const createRun = (
  workspaceId: string,
  body: CreateRunRequest,
  idempotencyKey: string,
): Promise<Run> =>
  requestJson(inWorkspace(workspaceId, 'runs'), run, {
    method: 'POST',
    body,
    headers: { 'idempotency-key': idempotencyKey },
  });

/** What a run up to this highest dimension would need; a worker counts it while the page waits. */
export const getEstimate = (
  workspaceId: string,
  revisionId: string,
  maxDimension: number,
): Promise<RunEstimate> =>
  requestJson(
    `${inWorkspace(workspaceId, 'revisions', revisionId, 'estimate')}?maxDimension=${maxDimension}`,
    runEstimate,
  );

export const getRun = (workspaceId: string, runId: string): Promise<Run> =>
  requestJson(inWorkspace(workspaceId, 'runs', runId), run);

export const stopRun = (workspaceId: string, runId: string): Promise<Run> =>
  requestJson(inWorkspace(workspaceId, 'runs', runId, 'stop'), run, { method: 'POST' });

export async function getRunBlock(
  workspaceId: string,
  runId: string,
  block: number,
  signal?: AbortSignal,
): Promise<MatrixBlock> {
  const path = inWorkspace(workspaceId, 'runs', runId, 'blocks', block);
  return decodeMatrixBlock(await requestBytes(path, signal));
}

export const getBarcode = (workspaceId: string, runId: string): Promise<RecordedBarcode> =>
  requestJson(inWorkspace(workspaceId, 'runs', runId, 'barcode'), recordedBarcode);

/** @param a,b node rows of the revision, in either order. */
export const getPair = (
  workspaceId: string,
  runId: string,
  a: number,
  b: number,
  signal?: AbortSignal,
): Promise<PairDetail> =>
  requestJson(inWorkspace(workspaceId, 'runs', runId, 'pairs', a, b), pairDetail, { signal });

/** Addresses of the downloads, for a plain link. */
export const pairsCsvPath = (workspaceId: string, runId: string): string =>
  inWorkspace(workspaceId, 'runs', runId, 'pairs.csv');
export const barcodesCsvPath = (workspaceId: string, runId: string): string =>
  inWorkspace(workspaceId, 'runs', runId, 'barcodes.csv');
