import { failRun, type Fence, type RunFailure } from '../../db/repositories/runWork';
import type { Outcome } from '../pool/tasks';
import { tryAgain } from '../reconciler';
import type { Context } from './context';

type Unfinished = Exclude<Outcome<never>, { kind: 'finished' }>;

/** @returns what the requester reads; null where trying again makes sense. */
export function failureOf(
  outcome: Exclude<Unfinished, { kind: 'stopped' }>,
  heapMegabytes: number,
): RunFailure | null {
  switch (outcome.kind) {
    case 'refused':
      return { code: outcome.code, message: outcome.message };
    case 'broken':
      return {
        code: 'engine.broken',
        message:
          'The computation met a fault of its own and was ended; the log of the worker names it. Nothing else is affected.',
      };
    case 'crashed':
      if (!outcome.outOfMemory) return null;
      return {
        code: 'engine.out_of_memory',
        message: `The computation needed more than the ${heapMegabytes} MB that a thread may use. Choose fewer dimensions or a smaller network.`,
      };
  }
}

/** Ends, repeats or hands over a run whose task did not finish. */
export async function settle(outcome: Unfinished, fence: Fence, context: Context): Promise<void> {
  const { db, activity, config, log, mailRule } = context;
  if (outcome.kind === 'stopped') {
    activity.handOverIfClosing();
    return;
  }
  log.warn({ ...fence, outcome }, 'a task did not finish');
  const failure = failureOf(outcome, config.heapMegabytes);
  if (failure) await failRun(db, fence, failure, mailRule);
  else await tryAgain(db, fence, mailRule);
}
