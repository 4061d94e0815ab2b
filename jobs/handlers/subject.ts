import type { WorkRun } from '../../db/repositories/runWork';
import type { Subject } from '../pool/tasks';
import type { Context } from './context';

/** @returns what a thread needs of the run, or null if its dataset was deleted. */
export async function subjectOf(run: WorkRun, context: Context): Promise<Subject | null> {
  const network = await context.networks.of(run);
  if (!network) return null;
  const maxDimension = Math.max(...run.dimensions);
  return {
    key: `${run.revisionId} ${run.scale} ${maxDimension}`,
    network,
    maxDimension,
    limits: context.config.limits,
  };
}
