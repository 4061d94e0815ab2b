import { ref } from 'vue';
import { defineStore } from 'pinia';
import type { RunBrief } from '#contract/datasets';
import type { RunState } from '#contract/enums';
import type { ProgressEvent } from '#contract/progress';
import type { CreateRunRequest, RunEstimate, StartedRun } from '#contract/runs';
import { getRevision } from '../api/datasets';
import { followRun } from '../api/progress';
import * as api from '../api/runs';
import { filtrationOf } from '../graphs/filtration';

/** What is known of a run while it is followed. */
export interface RunProgress {
  state: RunState;
  pairsDone: number;
  pairsTotal: number;
  millisecondsLeft: number | null;
  failure: { code: string; message: string } | null;
  /** The progress stream is down and being tried again. */
  down: boolean;
}

/** @returns whether nothing more will happen to a run in this state. */
export const isFinal = (state: RunState): boolean =>
  state === 'done' || state === 'failed' || state === 'stopped';

/** Runs as the server tells them; every state comes from there, so a reload loses nothing. */
export const useRunsStore = defineStore('runs', () => {
  const progress = ref<Record<string, RunProgress>>({});

  function take(event: ProgressEvent): void {
    const { state, pairsDone, pairsTotal, millisecondsLeft, failure } = event;
    progress.value[event.runId] = {
      state,
      pairsDone,
      pairsTotal,
      millisecondsLeft,
      failure,
      down: false,
    };
  }

  /** @returns ends the following. */
  function follow(workspaceId: string, runId: string): () => void {
    return followRun(workspaceId, runId, {
      onProgress: take,
      onDown: (down) => {
        const known = progress.value[runId];
        if (known) known.down = down;
      },
    });
  }

  /** Fetches a run as it stands now, e.g. why it failed. */
  async function recall(workspaceId: string, runId: string): Promise<void> {
    const { state, pairsDone, pairsTotal, failure } = await api.getRun(workspaceId, runId);
    const known = { state, pairsDone, pairsTotal, failure, millisecondsLeft: null, down: false };
    progress.value[runId] = known;
  }

  /** The run that answered the latest wish because it had been computed before. */
  const found = ref<string | null>(null);

  /** Starts a run, or finds one that is equal: nothing is computed twice. */
  async function start(
    workspaceId: string,
    body: CreateRunRequest,
    key: string,
  ): Promise<StartedRun> {
    const run = await api.createRun(workspaceId, body, key);
    found.value = run.found ? run.id : null;
    return run;
  }

  const estimate = (workspaceId: string, wanted: api.EstimateWanted): Promise<RunEstimate> =>
    api.getEstimate(workspaceId, wanted);

  /** @returns the node row at every arrival position of a revision. */
  async function arrivalOrder(workspaceId: string, revisionId: string): Promise<Uint32Array> {
    const { nodes } = await getRevision(workspaceId, revisionId);
    const entries = nodes.map(({ entry }) => entry);
    return filtrationOf(entries, 'entry').order;
  }

  async function stop(workspaceId: string, runId: string): Promise<void> {
    const run = await api.stopRun(workspaceId, runId);
    const known = progress.value[runId];
    if (known) Object.assign(known, { state: run.state, pairsDone: run.pairsDone });
  }

  /** The latest known state of a run of a list. */
  const stateOf = (run: RunBrief): RunState => progress.value[run.id]?.state ?? run.state;

  return { progress, found, follow, recall, start, estimate, arrivalOrder, stop, stateOf };
});
