import type { ProgressEvent } from '#contract/progress';
import type { Run, WireBars } from '#contract/runs';
import type { StoredBars } from '../../db/codecs/barcode';
import type { RunProgress, RunView } from '../../db/repositories/runs';

interface Failed {
  readonly failureCode: string | null;
  readonly failureMessage: string | null;
}

const failureOf = ({ failureCode, failureMessage }: Failed) =>
  failureCode === null ? null : { code: failureCode, message: failureMessage ?? '' };

/** @param landed block numbers in the order they landed */
export function presentRun(row: RunView, landed: readonly number[]): Run {
  return {
    id: row.id,
    workspaceId: row.workspaceId,
    datasetId: row.datasetId,
    datasetName: row.datasetName,
    invented: row.invented,
    revisionId: row.revisionId,
    revisionNumber: row.revisionNumber,
    contentHash: row.contentHash,
    number: row.number,
    scale: row.scale,
    dimensions: row.dimensions,
    part: row.part,
    extendedFrom: row.extendedFrom,
    engineVersion: row.engineVersion,
    state: row.state,
    nodeCount: row.nodeCount,
    pairsDone: row.pairsDone,
    pairsTotal: row.pairsTotal,
    blockCount: row.blockCount ?? 0,
    blocksDone: [...landed],
    requestedBy: row.requestedByName,
    createdAt: row.createdAt.toISOString(),
    startedAt: row.startedAt?.toISOString() ?? null,
    finishedAt: row.finishedAt?.toISOString() ?? null,
    failure: failureOf(row),
  };
}

/** @param blocks those that landed since the listener's last event */
export function presentProgress(
  runId: string,
  progress: RunProgress,
  blocks: readonly number[],
): ProgressEvent {
  const { state, pairsDone, pairsTotal } = progress;
  return {
    runId,
    state,
    pairsDone,
    pairsTotal,
    blockCount: progress.blockCount ?? 0,
    blocks: [...blocks],
    millisecondsLeft: millisecondsLeft(progress),
    failure: failureOf(progress),
  };
}

/** Pairs left at the mean speed since the run, or its extension, began; null without one. */
function millisecondsLeft(progress: RunProgress): number | null {
  const { state, pairsDone, pairsTotal, pairsBefore, runningFor } = progress;
  const lately = pairsDone - pairsBefore;
  if (state !== 'running' || runningFor === null || lately === 0) return null;
  return Math.round((runningFor / lately) * (pairsTotal - pairsDone));
}

export const presentBars = ({ births, deaths }: StoredBars): WireBars =>
  Array.from(births, (birth, k) => {
    const death = deaths[k] ?? Infinity;
    return [birth, death === Infinity ? null : death];
  });
