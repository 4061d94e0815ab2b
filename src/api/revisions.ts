import { originalFiles, type OriginalFiles } from '#contract/exports';
import { importWeights, type ImportWeights } from '#contract/imports';
import {
  madeRevision,
  revisionDifference,
  type CorrectionsRequest,
  type MadeRevision,
  type RevisionDifference,
  type ThresholdRequest,
} from '#contract/revisions';
import { inWorkspace, requestJson } from './client';

export const getDifference = (
  workspaceId: string,
  revisionId: string,
): Promise<RevisionDifference> =>
  requestJson(inWorkspace(workspaceId, 'revisions', revisionId, 'difference'), revisionDifference);

export async function getRevisionWeights(
  workspaceId: string,
  revisionId: string,
): Promise<ImportWeights['weights']> {
  const path = inWorkspace(workspaceId, 'revisions', revisionId, 'weights');
  return (await requestJson(path, importWeights)).weights;
}

export const makeThreshold = (
  workspaceId: string,
  revisionId: string,
  body: ThresholdRequest,
): Promise<MadeRevision> =>
  requestJson(inWorkspace(workspaceId, 'revisions', revisionId, 'threshold'), madeRevision, {
    method: 'POST',
    body,
  });

export const makeCorrections = (
  workspaceId: string,
  revisionId: string,
  body: CorrectionsRequest,
): Promise<MadeRevision> =>
  requestJson(inWorkspace(workspaceId, 'revisions', revisionId, 'corrections'), madeRevision, {
    method: 'POST',
    body,
  });

export async function getOriginals(
  workspaceId: string,
  revisionId: string,
): Promise<OriginalFiles['files']> {
  const path = inWorkspace(workspaceId, 'revisions', revisionId, 'originals');
  return (await requestJson(path, originalFiles)).files;
}
