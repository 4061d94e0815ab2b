import { performance } from 'node:perf_hooks';
import { decodeMatrixBlock } from '#contract/matrixBytes';
import { secondsSince } from '../poolRuns';
import type { Visitor } from './visitor';

/** Blocks fetched at the same time, as the bench page does. */
const PARALLEL = 3;

export interface WatchedRun {
  readonly id: string;
  /** Seconds from the submission until the first rows are fetched and decoded. */
  readonly first: number;
  /** Seconds until all are. */
  readonly whole: number;
}

/**
 * Starts a run and follows it as the bench page does: its run, revision and progress, and every block
 * as it lands, decoded.
 * @throws Error if the run does not finish or pairs are missing
 */
export async function watchRun(
  visitor: Visitor,
  revisionId: string,
  pairs: number,
): Promise<WatchedRun> {
  const start = performance.now();
  const { path, id } = await visitor.submit(revisionId);
  await Promise.all([visitor.get(path), visitor.revision(revisionId)]);
  let first = 0;
  let decoded = 0;
  const waiting: number[] = [];
  const asked = new Set<number>();
  const fetching = new Set<Promise<void>>();
  const next = (): void => {
    const block = fetching.size < PARALLEL ? waiting.shift() : undefined;
    if (block === undefined) return;
    const one = visitor.bytes(`${path}/blocks/${block}`).then((bytes) => {
      decoded += decodeMatrixBlock(bytes).pairCount;
      if (first === 0) first = secondsSince(start);
      fetching.delete(one);
      next();
    });
    fetching.add(one);
    next();
  };
  let state = 'queued';
  for await (const event of visitor.events(path)) {
    ({ state } = event);
    for (const block of event.blocks) {
      if (!asked.has(block)) waiting.push(block);
      asked.add(block);
    }
    next();
  }
  while (fetching.size > 0) await Promise.race(fetching);
  const whole = secondsSince(start);
  if (state !== 'done' || decoded !== pairs) {
    throw new Error(`A run ended as ${state} with ${decoded} of ${pairs} pairs.`);
  }
  return { id, first, whole };
}
