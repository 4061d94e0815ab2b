import { markRaw, shallowReactive } from 'vue';
import { defineStore } from 'pinia';
import type { WireBars } from '#contract/runs';
import { ApiProblem } from '../api/client';
import { getRevision } from '../api/datasets';
import { getBarcode, getRun, getRunBlock } from '../api/runs';
import { filtrationOf } from '../graphs/filtration';
import { coveredPairs } from '../graphs/runPart';
import { measureField, type MeasureField } from '../graphs/measures';
import { SwapMatrix } from '../graphs/swapMatrix';

/** Above this many nodes a cell of the thumbnail is under a pixel, and its blocks are not fetched. */
const MOST_NODES = 128;

/** What a thumbnail of a finished run shows. */
export interface Swatch {
  readonly nodeCount: number;
  /** f by arrival position. */
  readonly values: Float64Array;
  /** Change ÷ bound of every pair; null for a large network. */
  readonly field: MeasureField | null;
  /** Chosen dimensions and the recorded bars, index = dimension. */
  readonly dimensions: readonly number[];
  readonly bars: readonly WireBars[];
}

/** Thumbnails by run. A finished run never changes, so each is fetched once. */
export const useSwatchesStore = defineStore('swatches', () => {
  const swatches = shallowReactive(new Map<string, Swatch>());
  const asked = new Set<string>();

  /** Fetches the thumbnail of a finished run, unless it was asked for before. */
  async function load(workspaceId: string, runId: string): Promise<void> {
    if (asked.has(runId)) return;
    asked.add(runId);
    try {
      swatches.set(runId, markRaw(await fetchSwatch(workspaceId, runId)));
    } catch (error) {
      // The row says all in words; without its picture the warp threads stay.
      if (!(error instanceof ApiProblem)) throw error;
      asked.delete(runId);
    }
  }

  return { swatches, load };
});

async function fetchSwatch(workspaceId: string, runId: string): Promise<Swatch> {
  const run = await getRun(workspaceId, runId);
  const { nodeCount, dimensions, scale } = run;
  const [revision, barcode] = await Promise.all([
    getRevision(workspaceId, run.revisionId),
    getBarcode(workspaceId, runId),
  ]);
  const entries = revision.nodes.map((node) => node.entry);
  const { values } = filtrationOf(entries, scale);
  const base = { nodeCount, values, dimensions, bars: barcode.bars };
  if (nodeCount > MOST_NODES) return { ...base, field: null };
  const covered = coveredPairs(run.part, revision.nodes);
  const matrix = new SwapMatrix(nodeCount, Math.max(...dimensions) + 1, covered);
  for (const block of run.blocksDone) matrix.place(await getRunBlock(workspaceId, runId, block));
  return { ...base, field: measureField(matrix, values, 'change', dimensions) };
}
