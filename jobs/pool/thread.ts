import {
  ENGINE_VERSION,
  adoptPrepared,
  computePairs,
  computeRows,
  estimate,
  partnersOf,
  planPairs,
  prepare,
  preparedData,
  recordedBarcode,
  remainderOf,
  similarity,
  swapDetail,
  waysOut,
  type Prepared,
  type PreparedData,
} from '../engine/index';
import { EngineInputError, EngineLimitError, EngineStopped, type Control } from '../engine/types';
import type { EstimateResult, Outcome, PairResult, PlanResult, ResultOf, Task } from './tasks';

/** Prepared networks with this thread's own buffers, by subject, the latest used last. */
const kept = new Map<string, Prepared>();
const MOST_KEPT = 2;

/** Whether a task that began then has had its time. */
const isLate = ({ timeLimit }: Task, from: number): boolean =>
  timeLimit !== undefined && performance.now() - from > 1000 * timeLimit.seconds;

function controlOf(task: Task, from: number): Control {
  const { control } = task;
  return {
    shouldStop: () => Atomics.load(control, 0) === 1 || isLate(task, from),
    onProgress: (pairsDone) => void Atomics.store(control, 1, pairsDone),
  };
}

function preparedFor({ subject, tables }: Task): Prepared {
  const found = kept.get(subject.key);
  kept.delete(subject.key);
  if (!found) {
    // Room first: the buffers of one run may take most of what a thread is allowed.
    while (kept.size >= MOST_KEPT) kept.delete(kept.keys().next().value ?? '');
  }
  if (!found && tables === null) throw new Error('A task came without the tables of its run.');
  const prepared = found ?? adoptPrepared(tables!, subject.limits);
  kept.set(subject.key, prepared);
  return prepared;
}

function prepareShared({ subject }: Task, control: Control): PreparedData {
  const { network, maxDimension, limits } = subject;
  return preparedData(prepare(network, maxDimension, limits, control, 'shared'));
}

function plan(task: Task & { kind: 'plan' }): PlanResult {
  const { network, maxDimension, limits } = task.subject;
  const estimated = estimate(network, maxDimension, limits, task.part);
  const partners = task.stored
    ? remainderOf(partnersOf(task.stored, network.nodeCount))
    : partnersOf(task.part, network.nodeCount);
  const prepared = preparedFor(task);
  return {
    engineVersion: ENGINE_VERSION,
    estimate: estimated,
    barcode: recordedBarcode(prepared),
    blocks: planPairs(prepared, task.secondsPerBlock, partners),
  };
}

function estimated(task: Task & { kind: 'estimate' }): EstimateResult {
  const { network, maxDimension, limits } = task.subject;
  const { part, overlapping, budget } = task;
  const needed = estimate(network, maxDimension, limits, part);
  const ways = overlapping && waysOut({ network, maxDimension, part, overlapping }, needed, budget);
  return { estimate: needed, ways };
}

function pair(task: Task & { kind: 'pair' }): PairResult {
  const detail = swapDetail(preparedFor(task), task.p, task.q);
  return { detail, similarity: similarity(detail.distances, detail.bound, task.dimensions) };
}

function run(task: Task, control: Control): ResultOf<Task['kind']> {
  switch (task.kind) {
    case 'prepare':
      return prepareShared(task, control);
    case 'plan':
      return plan(task);
    case 'estimate':
      return estimated(task);
    case 'rows':
      return computeRows(preparedFor(task), task.rows, control);
    case 'pairs':
      return computePairs(preparedFor(task), task.choice, control);
    case 'pair':
      return pair(task);
  }
}

/** One task of the pool. */
export default function work(task: Task): Outcome<ResultOf<Task['kind']>> {
  const from = performance.now();
  try {
    const result = run(task, controlOf(task, from));
    const seconds = (performance.now() - from) / 1000;
    return { kind: 'finished', result, seconds, bytes: kept.get(task.subject.key)?.peakBytes ?? 0 };
  } catch (error) {
    if (error instanceof EngineStopped) {
      return task.timeLimit && isLate(task, from)
        ? { kind: 'refused', code: 'engine.limit_seconds', message: task.timeLimit.refusal }
        : { kind: 'stopped' };
    }
    if (error instanceof EngineLimitError) {
      return { kind: 'refused', code: `engine.limit_${error.limit}`, message: error.message };
    }
    if (error instanceof EngineInputError) {
      return { kind: 'refused', code: 'engine.input', message: error.message };
    }
    if (error instanceof RangeError && /allocation failed/i.test(error.message)) {
      return {
        kind: 'refused',
        code: 'engine.out_of_memory',
        message: 'This machine has no memory left for the tables of this run.',
      };
    }
    const message = error instanceof Error ? (error.stack ?? error.message) : String(error);
    return { kind: 'broken', message };
  }
}
