import { markRaw, ref, shallowRef } from 'vue';
import { defineStore } from 'pinia';
import type { Revision } from '#contract/datasets';
import type { ProgressEvent } from '#contract/progress';
import type { RecordedBarcode, Run, RunFocusRequest } from '#contract/runs';
import { ApiProblem, asProblem } from '../api/client';
import { getRevision } from '../api/datasets';
import { followRun } from '../api/progress';
import { extendRun, focusRun, getBarcode, getRun, getRunBlock, stopRun } from '../api/runs';
import { coveredPairs } from '../graphs/runPart';
import { SwapMatrix } from '../graphs/swapMatrix';

/** Blocks fetched at the same time. */
const PARALLEL = 3;

/** The run on the bench: its revision, its matrix as far as it has landed, and its progress. */
export const useBenchRunStore = defineStore('benchRun', () => {
  const run = shallowRef<Run | null>(null);
  const revision = shallowRef<Revision | null>(null);
  const barcode = shallowRef<RecordedBarcode | null>(null);
  const matrix = shallowRef<SwapMatrix | null>(null);
  /** Grows when pairs have landed; the matrix itself is not reactive. */
  const landed = ref(0);
  const millisecondsLeft = ref<number | null>(null);
  const streamDown = ref(false);
  const stopping = ref(false);
  const extending = ref(false);
  const problem = shallowRef<ApiProblem | null>(null);

  let opened = 0;
  let leave = (): void => undefined;

  async function open(workspaceId: string, runId: string): Promise<void> {
    close();
    const visit = (opened += 1);
    try {
      const found = await getRun(workspaceId, runId);
      const [network, bars] = await Promise.all([
        getRevision(workspaceId, found.revisionId),
        getBarcodeIfThere(workspaceId, found),
      ]);
      if (visit !== opened) return;
      const dimensions = Math.max(...found.dimensions) + 1;
      matrix.value = markRaw(
        new SwapMatrix(found.nodeCount, dimensions, coveredPairs(found.part, network.nodes)),
      );
      revision.value = markRaw(network);
      barcode.value = bars;
      run.value = found;
      follow(workspaceId, found);
    } catch (error) {
      if (visit === opened) problem.value = asProblem(error);
    }
  }

  /** A run that failed or has not been planned may have no barcode; that is not a problem here. */
  async function getBarcodeIfThere(
    workspaceId: string,
    found: Run,
  ): Promise<RecordedBarcode | null> {
    try {
      return markRaw(await getBarcode(workspaceId, found.id));
    } catch (error) {
      if (found.state === 'done') throw error;
      return null;
    }
  }

  function follow(workspaceId: string, found: Run): void {
    const queue = blockQueue(workspaceId, found.id);
    queue.add(found.blocksDone);
    if (found.state !== 'queued' && found.state !== 'running') {
      leave = () => queue.end();
      return;
    }
    const unfollow = followRun(workspaceId, found.id, {
      onProgress: (event) => {
        receive(event);
        queue.add(event.blocks);
        if (event.state === 'done' || event.state === 'stopped' || event.state === 'failed') {
          void refresh(workspaceId, found.id);
        }
      },
      onDown: (down) => (streamDown.value = down),
    });
    leave = () => {
      unfollow();
      queue.end();
    };
  }

  function receive(event: ProgressEvent): void {
    if (run.value === null || run.value.id !== event.runId) return;
    const { state, pairsDone, pairsTotal, blockCount, failure } = event;
    run.value = { ...run.value, state, pairsDone, pairsTotal, blockCount, failure };
    millisecondsLeft.value = event.millisecondsLeft;
  }

  /** Reads times and the barcode once a run has ended. */
  async function refresh(workspaceId: string, runId: string): Promise<void> {
    try {
      const found = await getRun(workspaceId, runId);
      if (run.value?.id !== runId) return;
      run.value = found;
      barcode.value ??= await getBarcodeIfThere(workspaceId, found);
    } catch (error) {
      problem.value = asProblem(error);
    }
  }

  /** Fetches blocks in the order they landed, a few at a time, each once. */
  function blockQueue(workspaceId: string, runId: string) {
    const asked = new Set<number>();
    const waiting: number[] = [];
    const controller = new AbortController();
    let busy = 0;
    const next = (): void => {
      const block = busy < PARALLEL ? waiting.shift() : undefined;
      if (block === undefined) return;
      busy += 1;
      void fetchBlock(block).finally(() => {
        busy -= 1;
        next();
      });
      next();
    };
    async function fetchBlock(block: number): Promise<void> {
      try {
        const bytes = await getRunBlock(workspaceId, runId, block, controller.signal);
        if (controller.signal.aborted) return;
        matrix.value?.place(bytes);
        landed.value += 1;
        barcode.value ??= await getBarcodeIfThere(
          workspaceId,
          run.value ?? (await getRun(workspaceId, runId)),
        );
      } catch (error) {
        if (!controller.signal.aborted) problem.value = asProblem(error);
      }
    }
    return {
      add(blocks: readonly number[]) {
        for (const block of blocks) {
          if (asked.has(block)) continue;
          asked.add(block);
          waiting.push(block);
        }
        next();
      },
      end: () => controller.abort(),
    };
  }

  async function stop(workspaceId: string): Promise<void> {
    if (run.value === null) return;
    stopping.value = true;
    try {
      run.value = await stopRun(workspaceId, run.value.id);
    } catch (error) {
      problem.value = asProblem(error);
    } finally {
      stopping.value = false;
    }
  }

  /** Computes the pairs that the run left out, and follows it again. */
  async function extend(workspaceId: string): Promise<void> {
    if (run.value === null) return;
    const { id } = run.value;
    extending.value = true;
    try {
      await extendRun(workspaceId, id);
      await open(workspaceId, id);
    } catch (error) {
      problem.value = asProblem(error);
    } finally {
      extending.value = false;
    }
  }

  /** Tells the server what is looked at while the run goes. */
  async function focus(workspaceId: string, looked: RunFocusRequest): Promise<void> {
    if (run.value === null) return;
    try {
      await focusRun(workspaceId, run.value.id, looked);
    } catch (error) {
      // Only the order of the blocks depends on it: a run that has just ended refuses, and all is there.
      if (!(error instanceof ApiProblem)) throw error;
    }
  }

  function close(): void {
    opened += 1;
    leave();
    leave = () => undefined;
    run.value = null;
    revision.value = null;
    barcode.value = null;
    matrix.value = null;
    problem.value = null;
    millisecondsLeft.value = null;
    streamDown.value = false;
  }

  return {
    run,
    revision,
    barcode,
    matrix,
    landed,
    millisecondsLeft,
    streamDown,
    stopping,
    extending,
    problem,
    open,
    stop,
    extend,
    focus,
    close,
  };
});
