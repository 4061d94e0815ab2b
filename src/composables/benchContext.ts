import { computed, inject, provide, type ComputedRef, type InjectionKey } from 'vue';
import type { Run } from '#contract/runs';
import type { Amount } from '../drawings/barWords';
import type { SwapMatrix } from '../graphs/swapMatrix';
import { useBenchGroupsStore } from '../stores/benchGroups';
import { useBenchRunStore } from '../stores/benchRun';
import { useBenchCursor } from './benchCursor';
import { useBenchDetail } from './benchDetail';
import { useBenchFields } from './benchFields';
import { useBenchFocus } from './benchFocus';
import { useBenchInks } from './benchInks';
import type { BenchNetwork } from './benchNetwork';
import { benchPairs } from './benchPairs';
import type { GroupChoice } from './benchQuery';
import { useBenchView } from './benchView';
import { amountOf } from './benchWords';

/** The run on the bench once it has been read. */
export interface BenchSubject {
  readonly workspaceId: string;
  readonly run: () => Run;
  readonly network: BenchNetwork;
  readonly matrix: SwapMatrix;
}

/** What every part of the bench shares: the subject, the view in the address, the one cursor. */
function makeBench(subject: BenchSubject) {
  const store = useBenchRunStore();
  const { network, matrix, run } = subject;
  const { view, change } = useBenchView(() => matrix.nodeCount);
  const { dimensions, id: runId } = run();
  const amount: Amount = amountOf(run().scale, store.revision?.entryUnit ?? 'number');
  const ended = computed(() => !['queued', 'running'].includes(run().state));
  const fields = useBenchFields({ matrix, network, dimensions, view, ended });
  const pairs = benchPairs(run(), matrix, network, amount);
  const { order } = network.filtration;
  useBenchDetail({ workspaceId: subject.workspaceId, runId }, matrix, order, () => view.value.pair);
  useBenchFocus(
    subject.workspaceId,
    () => view.value,
    order,
    () => ended.value,
  );
  const choice = computed(() => view.value.group);
  const group = useMarkedGroup(choice, network, () => fields.communities.value?.communities ?? []);
  return {
    ...subject,
    ...fields,
    ...pairs,
    ...useBenchCursor(change, pairs.describe),
    n: matrix.nodeCount,
    values: network.filtration.values,
    dimensions,
    amount,
    view,
    change,
    inks: useBenchInks(),
    ended,
    /** Arrival positions of the marked group, ascending. */
    group,
  };
}

/** Arrival positions of the group that is marked; empty while it is not known or gone. */
function useMarkedGroup(
  choice: ComputedRef<GroupChoice | null>,
  network: BenchNetwork,
  communities: () => readonly (readonly number[])[],
): ComputedRef<readonly number[]> {
  const store = useBenchGroupsStore();
  return computed(() => {
    if (choice.value === null) return [];
    switch (choice.value.kind) {
      case 'community':
        return communities()[choice.value.index] ?? [];
      case 'hand':
        return choice.value.positions;
      case 'saved': {
        const { id } = choice.value;
        const ids = new Set(store.groups.find((saved) => saved.id === id)?.nodeIds ?? []);
        return network.nodes.flatMap((node, p) => (ids.has(node.id) ? [p] : []));
      }
    }
  });
}

export type Bench = ReturnType<typeof makeBench>;
const KEY: InjectionKey<Bench> = Symbol('bench');

export function provideBench(subject: BenchSubject): Bench {
  const bench = makeBench(subject);
  provide(KEY, bench);
  return bench;
}

export function useBench(): Bench {
  const bench = inject(KEY);
  if (bench === undefined) throw new Error('This part belongs on a bench.');
  return bench;
}
