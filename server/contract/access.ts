import type { Role } from './enums';

/**
 * Role × route: the only place that says who may do what. The router refuses to start with a route
 * that is not listed here, and the tests walk every row. `public` needs no session, `account` any
 * session; otherwise the roles of the workspace in the path. Someone without a membership gets 404,
 * a member whose role is not listed 403.
 */
export type Access = 'public' | 'account' | readonly Role[];

export interface RouteRule {
  readonly method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  readonly path: string;
  readonly access: Access;
  readonly summary: string;
}

const EVERYONE = ['owner', 'analyst', 'recorder', 'reviewer'] as const;
const EDITORS = ['owner', 'analyst'] as const;
const RECORDERS = ['owner', 'analyst', 'recorder'] as const;
const OWNERS = ['owner'] as const;

const W = '/api/workspaces/:workspaceId';

export const ROUTES = {
  health: { method: 'get', path: '/health', access: 'public', summary: 'The process lives' },
  ready: { method: 'get', path: '/ready', access: 'public', summary: 'A job was consumed lately' },
  instance: {
    method: 'get',
    path: '/api/instance',
    access: 'public',
    summary: 'What a visitor may know',
  },
  signUp: { method: 'post', path: '/api/accounts', access: 'public', summary: 'Make an account' },
  signIn: { method: 'post', path: '/api/session', access: 'public', summary: 'Sign in' },
  me: { method: 'get', path: '/api/session', access: 'account', summary: 'Who I am' },
  signOut: { method: 'delete', path: '/api/session', access: 'account', summary: 'Sign out' },
  createWorkspace: {
    method: 'post',
    path: '/api/workspaces',
    access: 'account',
    summary: 'Make a workspace and own it',
  },
  workspace: { method: 'get', path: W, access: EVERYONE, summary: 'The workspace' },
  members: { method: 'get', path: `${W}/members`, access: EVERYONE, summary: 'Its members' },
  addMember: { method: 'post', path: `${W}/members`, access: OWNERS, summary: 'Add a member' },
  changeMember: {
    method: 'patch',
    path: `${W}/members/:userId`,
    access: OWNERS,
    summary: 'Change a role',
  },
  removeMember: {
    method: 'delete',
    path: `${W}/members/:userId`,
    access: OWNERS,
    summary: 'Remove a member',
  },
  datasets: { method: 'get', path: `${W}/datasets`, access: EVERYONE, summary: 'Its datasets' },
  createDataset: {
    method: 'post',
    path: `${W}/datasets`,
    access: EDITORS,
    summary: 'Bring a network in',
  },
  growthModels: {
    method: 'get',
    path: `${W}/growth-models`,
    access: EVERYONE,
    summary: 'Models that a network can be grown from',
  },
  growDataset: {
    method: 'post',
    path: `${W}/datasets/from-model`,
    access: EDITORS,
    summary: 'Grow a network from a model',
  },
  dataset: {
    method: 'get',
    path: `${W}/datasets/:datasetId`,
    access: EVERYONE,
    summary: 'One dataset',
  },
  deletedDatasets: {
    method: 'get',
    path: `${W}/deleted-datasets`,
    access: EDITORS,
    summary: 'What was deleted and can be restored',
  },
  archiveDataset: {
    method: 'post',
    path: `${W}/datasets/:datasetId/archive`,
    access: EDITORS,
    summary: 'Take a dataset out of the list',
  },
  restoreDataset: {
    method: 'post',
    path: `${W}/datasets/:datasetId/restore`,
    access: EDITORS,
    summary: 'Bring an archived or deleted dataset back',
  },
  deleteDataset: {
    method: 'delete',
    path: `${W}/datasets/:datasetId`,
    access: EDITORS,
    summary: 'Delete a dataset, for 30 days restorable',
  },
  purgeDataset: {
    method: 'post',
    path: `${W}/datasets/:datasetId/purge`,
    access: OWNERS,
    summary: 'Remove a dataset for good',
  },
  createRevision: {
    method: 'post',
    path: `${W}/datasets/:datasetId/revisions`,
    access: EDITORS,
    summary: 'Bring a new revision in',
  },
  imports: {
    method: 'get',
    path: `${W}/imports`,
    access: EVERYONE,
    summary: 'Imports begun and not saved',
  },
  createImport: {
    method: 'post',
    path: `${W}/imports`,
    access: EDITORS,
    summary: 'Begin an import',
  },
  importDraft: {
    method: 'get',
    path: `${W}/imports/:importId`,
    access: EVERYONE,
    summary: 'One import and what was found',
  },
  changeImport: {
    method: 'patch',
    path: `${W}/imports/:importId`,
    access: EDITORS,
    summary: 'Say what the files mean',
  },
  importProblems: {
    method: 'get',
    path: `${W}/imports/:importId/problems.csv`,
    access: EVERYONE,
    summary: 'What is wrong with its files as CSV',
  },
  importWeights: {
    method: 'get',
    path: `${W}/imports/:importId/weights`,
    access: EVERYONE,
    summary: 'How many edges each weight keeps',
  },
  saveImport: {
    method: 'post',
    path: `${W}/imports/:importId/save`,
    access: EDITORS,
    summary: 'Save an import as a revision',
  },
  deleteImport: {
    method: 'delete',
    path: `${W}/imports/:importId`,
    access: EDITORS,
    summary: 'Remove an import that was not saved',
  },
  revision: {
    method: 'get',
    path: `${W}/revisions/:revisionId`,
    access: EVERYONE,
    summary: 'Nodes and edges of a revision',
  },
  revisionDifference: {
    method: 'get',
    path: `${W}/revisions/:revisionId/difference`,
    access: EVERYONE,
    summary: 'What it has otherwise than the one before',
  },
  revisionWeights: {
    method: 'get',
    path: `${W}/revisions/:revisionId/weights`,
    access: EVERYONE,
    summary: 'How many edges each weight keeps',
  },
  thresholdRevision: {
    method: 'post',
    path: `${W}/revisions/:revisionId/threshold`,
    access: EDITORS,
    summary: 'A new revision of its heavier edges',
  },
  correctRevision: {
    method: 'post',
    path: `${W}/revisions/:revisionId/corrections`,
    access: RECORDERS,
    summary: 'A new revision with corrected entries',
  },
  exportRevision: {
    method: 'get',
    path: `${W}/revisions/:revisionId/export/:kind`,
    access: EVERYONE,
    summary: 'A revision as it was understood, as a file',
  },
  originals: {
    method: 'get',
    path: `${W}/revisions/:revisionId/originals`,
    access: EVERYONE,
    summary: 'The files that a revision came from',
  },
  original: {
    method: 'get',
    path: `${W}/revisions/:revisionId/originals/:position`,
    access: EVERYONE,
    summary: 'One of them as it was sent',
  },
  runEstimate: {
    method: 'get',
    path: `${W}/revisions/:revisionId/estimate`,
    access: EVERYONE,
    summary: 'What a run of a revision would need',
  },
  createRun: { method: 'post', path: `${W}/runs`, access: EDITORS, summary: 'Start a run' },
  run: { method: 'get', path: `${W}/runs/:runId`, access: EVERYONE, summary: 'One run' },
  stopRun: {
    method: 'post',
    path: `${W}/runs/:runId/stop`,
    access: EDITORS,
    summary: 'Stop a run',
  },
  extendRun: {
    method: 'post',
    path: `${W}/runs/:runId/extend`,
    access: EDITORS,
    summary: 'Compute the other pairs of a part run',
  },
  focusRun: {
    method: 'put',
    path: `${W}/runs/:runId/focus`,
    access: EVERYONE,
    summary: 'Compute first what I look at',
  },
  runEvents: {
    method: 'get',
    path: `${W}/runs/:runId/events`,
    access: EVERYONE,
    summary: 'Progress as server-sent events',
  },
  runBlock: {
    method: 'get',
    path: `${W}/runs/:runId/blocks/:block`,
    access: EVERYONE,
    summary: 'One block of the matrix',
  },
  runBarcode: {
    method: 'get',
    path: `${W}/runs/:runId/barcode`,
    access: EVERYONE,
    summary: 'Barcode of the recorded order',
  },
  runPair: {
    method: 'get',
    path: `${W}/runs/:runId/pairs/:a/:b`,
    access: EVERYONE,
    summary: 'One swap in full',
  },
  runPairsCsv: {
    method: 'get',
    path: `${W}/runs/:runId/pairs.csv`,
    access: EVERYONE,
    summary: 'The matrix as CSV',
  },
  runBarcodesCsv: {
    method: 'get',
    path: `${W}/runs/:runId/barcodes.csv`,
    access: EVERYONE,
    summary: 'The recorded barcode as CSV',
  },
  groups: {
    method: 'get',
    path: `${W}/runs/:runId/groups`,
    access: EVERYONE,
    summary: 'Groups of a run',
  },
  createGroup: {
    method: 'post',
    path: `${W}/runs/:runId/groups`,
    access: EDITORS,
    summary: 'Save a group',
  },
  deleteGroup: {
    method: 'delete',
    path: `${W}/groups/:groupId`,
    access: EDITORS,
    summary: 'Delete a group',
  },
} as const satisfies Record<string, RouteRule>;

export type RouteName = keyof typeof ROUTES;

/** @returns whether a member with this role may use the route. */
export function mayUse(role: Role, route: RouteName): boolean {
  const { access }: RouteRule = ROUTES[route];
  return access === 'public' || access === 'account' || access.includes(role);
}
