import type { Db } from '../db/client';
import { purgeExpiredDatasets } from '../db/repositories/datasetLife';
import { redispatchImportEstimates } from '../db/repositories/importEstimates';
import { redispatchMails } from '../db/repositories/mails';
import { askForBeat } from '../db/repositories/outbox';
import { redispatchPairs } from '../db/repositories/pairDetails';
import { redispatchEstimates } from '../db/repositories/revisionEstimates';
import { listMissing } from '../db/repositories/runBlocks';
import { beginNextAttempt, listSilent, type SilentRun } from '../db/repositories/runDispatch';
import { failRun, type MailRule } from '../db/repositories/runWork';
import { blockJobId, finishJobId, planJobId } from './queue/jobs';
import type { Producer } from './queue/producer';

/** A run that was begun so often will not end by beginning it once more. */
export const MOST_ATTEMPTS = 25;

/** Milliseconds between looks. */
const INTERVAL = 5_000;
/** Seconds without a heartbeat after which nobody works on a run. */
const SILENCE = 8;
/** Seconds after which an unanswered question or an unsent message is asked for again. */
const PAIR_LATE = 10;
const MAIL_LATE = 120;
/** Seconds between two beats. */
const BEAT = 10;

/** BullMQ's words for a job that will be taken up; `active` without a heartbeat is a dead worker's. */
const WAITS = new Set(['waiting', 'prioritized', 'delayed', 'paused', 'waiting-children']);

/** Puts back on the queue what the database says is unfinished and nobody works on. */
export class Reconciler {
  readonly #timer: NodeJS.Timeout;
  #busy: Promise<void> | null = null;

  constructor(
    private readonly db: Db,
    private readonly producer: Producer,
    private readonly mail: MailRule,
    private readonly onError: (error: Error) => void,
  ) {
    this.#timer = setInterval(() => this.#look(), INTERVAL);
    this.#look();
  }

  async close(): Promise<void> {
    clearInterval(this.#timer);
    await this.#busy;
  }

  #look(): void {
    this.#busy ??= this.#reconcile()
      .catch((error: unknown) =>
        this.onError(error instanceof Error ? error : new Error(String(error))),
      )
      .finally(() => {
        this.#busy = null;
      });
  }

  async #reconcile(): Promise<void> {
    await askForBeat(this.db, BEAT);
    await redispatchPairs(this.db, PAIR_LATE);
    await redispatchEstimates(this.db, PAIR_LATE);
    await redispatchImportEstimates(this.db, PAIR_LATE);
    await redispatchMails(this.db, MAIL_LATE);
    await purgeExpiredDatasets(this.db);
    for (const run of await listSilent(this.db, SILENCE)) {
      if (await this.#isLost(run)) await tryAgain(this.db, run, this.mail);
    }
  }

  /** @throws if Redis is away: nothing is known then, and the run is looked at again later. */
  async #isLost({ runId, blockCount, dispatchId }: SilentRun): Promise<boolean> {
    if (blockCount === null) {
      return !WAITS.has(await this.producer.stateOf('runs', planJobId(dispatchId)));
    }
    const missing = await listMissing(this.db, runId);
    if (missing.length === 0) {
      return !WAITS.has(await this.producer.stateOf('runs', finishJobId(dispatchId)));
    }
    for (const block of missing) {
      const state = await this.producer.stateOf('blocks', blockJobId(dispatchId, block));
      if (!WAITS.has(state)) return true;
    }
    return false;
  }
}

/** Begins the next attempt, or ends the run if there were too many. */
export async function tryAgain(
  db: Db,
  fence: { readonly runId: string; readonly attempt: number },
  mail: MailRule,
): Promise<void> {
  if (fence.attempt < MOST_ATTEMPTS) {
    await beginNextAttempt(db, fence);
    return;
  }
  await failRun(
    db,
    fence,
    {
      code: 'runs.gave_up',
      message: `The run was begun ${MOST_ATTEMPTS} times and a worker was lost every time. Nothing else is affected; ask the person who keeps the workers to look at their log.`,
    },
    mail,
  );
}
