import { accountRoutes } from './accounts/routes';
import type { Sessions } from './auth/sessions';
import { datasetRoutes } from './datasets/routes';
import { datasetLifeRoutes } from './datasets/lifeRoutes';
import type { Dependencies } from './dependencies';
import { groupRoutes } from './groups/routes';
import { healthRoutes } from './health/routes';
import type { RouteMap } from './http/route';
import { importRoutes } from './imports/routes';
import { memberRoutes } from './members/routes';
import { modelRoutes } from './models/routes';
import { exportRoutes } from './exports/routes';
import { revisionRoutes } from './revisions/routes';
import { workspaceRoutes } from './workspaces/routes';

/** The rows of the access table that server/runs answers. */
export type RunRoutes = Pick<
  RouteMap,
  | 'runEstimate'
  | 'createRun'
  | 'run'
  | 'stopRun'
  | 'extendRun'
  | 'focusRun'
  | 'runEvents'
  | 'runBlock'
  | 'runBarcode'
  | 'runPair'
  | 'runPairsCsv'
  | 'runBarcodesCsv'
>;

/** Every row of the access table with its handler; a missing one is a type error. */
export function makeRoutes(
  dependencies: Dependencies,
  sessions: Sessions,
  runs: RunRoutes,
): RouteMap {
  return {
    ...healthRoutes(dependencies),
    ...accountRoutes(dependencies, sessions),
    ...workspaceRoutes(dependencies),
    ...memberRoutes(dependencies),
    ...datasetRoutes(dependencies),
    ...datasetLifeRoutes(dependencies),
    ...revisionRoutes(dependencies),
    ...exportRoutes(dependencies),
    ...importRoutes(dependencies),
    ...modelRoutes(dependencies),
    ...groupRoutes(dependencies),
    ...runs,
  };
}
