import { decodeMatrixBlock, type MatrixBlock } from '#contract/matrixBytes';
import {
  pairDetail,
  recordedBarcode,
  run,
  runEstimate,
  startedRun,
  type CreateRunRequest,
  type PairDetail,
  type RecordedBarcode,
  type Run,
  type RunEstimate,
  type RunFocusRequest,
  type StartedRun,
} from '#contract/runs';
import type { RunPart } from '#contract/enums';
import { inWorkspace, requestBytes, requestJson, requestNothing } from './client';

/**
 * @param idempotencyKey any text up to 200 characters; a repeat with the same key answers the same
 *   run, so a doubled click starts one.
 */
export const createRun = (
  workspaceId: string,
  body: CreateRunRequest,
  idempotencyKey: string,
): Promise<StartedRun> =>
  requestJson(inWorkspace(workspaceId, 'runs'), startedRun, {
    method: 'POST',
    body,
    headers: { 'idempotency-key': idempotencyKey },
  });

/** A part of the pairs of a revision, up to a highest dimension. */
export interface EstimateWanted {
  readonly revisionId: string;
  readonly maxDimension: number;
  readonly part: RunPart;
}

/** What a run would need; a worker counts it while the page waits. */
export function getEstimate(
  workspaceId: string,
  { revisionId, maxDimension, part }: EstimateWanted,
): Promise<RunEstimate> {
  const query = new URLSearchParams({
    maxDimension: String(maxDimension),
    part: JSON.stringify(part),
  });
  const path = inWorkspace(workspaceId, 'revisions', revisionId, 'estimate');
  return requestJson(`${path}?${query.toString()}`, runEstimate);
}

export const getRun = (workspaceId: string, runId: string): Promise<Run> =>
  requestJson(inWorkspace(workspaceId, 'runs', runId), run);

export const stopRun = (workspaceId: string, runId: string): Promise<Run> =>
  requestJson(inWorkspace(workspaceId, 'runs', runId, 'stop'), run, { method: 'POST' });

/** Computes the pairs that a finished part run left out; what is stored stays. */
export const extendRun = (workspaceId: string, runId: string): Promise<Run> =>
  requestJson(inWorkspace(workspaceId, 'runs', runId, 'extend'), run, { method: 'POST' });

/** Lets the pairs that are looked at go first. */
export const focusRun = (
  workspaceId: string,
  runId: string,
  body: RunFocusRequest,
): Promise<void> =>
  requestNothing(inWorkspace(workspaceId, 'runs', runId, 'focus'), { method: 'PUT', body });

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
