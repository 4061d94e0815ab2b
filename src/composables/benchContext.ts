import {
  computed,
  inject,
  provide,
  ref,
  shallowRef,
  type ComputedRef,
  type InjectionKey,
} from 'vue';
import type { Run } from '#contract/runs';
import type { Amount } from '../drawings/barWords';
import type { PairEvents } from '../drawings/drawing';
import { firstPositionAt } from '../graphs/filtration';
import { measureField, similarityOf, type Measure } from '../graphs/measures';
import { orderingOf } from '../graphs/ordering';
import { runSummary } from '../graphs/runSummary';
import { pairIndex, type Pair, type SwapMatrix } from '../graphs/swapMatrix';
import { safePairs } from '../graphs/swapSafeGraph';
import { useBenchGroupsStore } from '../stores/benchGroups';
import { useBenchRunStore } from '../stores/benchRun';
import { useBenchCommunities } from './benchCommunities';
import { useBenchDetail } from './benchDetail';
import { useBenchInks } from './benchInks';
import type { BenchNetwork } from './benchNetwork';
import { useBenchView } from './benchView';
import { amountOf, writeNumber, writeShare } from './benchWords';

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
  const groupsStore = useBenchGroupsStore();
  const { network, matrix, run } = subject;
  const { values } = network.filtration;
  const n = matrix.nodeCount;
  const { view, change } = useBenchView(() => n);
  const inks = useBenchInks();
  const dimensions = run().dimensions;
  const amount: Amount = amountOf(run().scale, store.revision?.entryUnit ?? 'number');

  // Read one by one, so that a new selection computes no measure and no order again.
  const dimension = computed(() => view.value.dimension);
  const measure = computed(() => view.value.measure);
  const lower = computed(() => view.value.lower);
  const ordering = computed(() => view.value.order);

  /** Dimensions of the measure on screen: one, or all chosen ones. */
  const shownDimensions = computed(() =>
    dimension.value !== null && dimensions.includes(dimension.value)
      ? [dimension.value]
      : dimensions,
  );
  const fieldOf = (name: ComputedRef<Measure>) =>
    computed(() => {
      void store.landed;
      const over = name.value === 'moves' ? dimensions : shownDimensions.value;
      return measureField(matrix, values, name.value, over);
    });
  const field = fieldOf(measure);
  const lowerField = fieldOf(lower);

  const complete = computed(() => store.landed >= 0 && matrix.knownCount === matrix.pairCount);
  const ended = computed(() => !['queued', 'running'].includes(run().state));
  const safe = computed(() => {
    void store.landed;
    return safePairs(matrix, dimensions);
  });
  const communities = useBenchCommunities(() =>
    ended.value || complete.value ? { nodeCount: n, safe: safe.value } : null,
  );
  const summary = computed(() => {
    void store.landed;
    return runSummary(matrix, values, dimensions);
  });
  const order = computed(() => {
    void store.landed;
    const input = {
      matrix,
      dimensions,
      labels: network.labels,
      communities: communities.value?.communities ?? [],
    };
    return orderingOf(ordering.value, input);
  });

  /** Arrival positions of the marked group. */
  const group = computed((): readonly number[] => {
    const choice = view.value.group;
    if (choice === null) return [];
    switch (choice.kind) {
      case 'community':
        return communities.value?.communities[choice.index] ?? [];
      case 'hand':
        return choice.positions;
      case 'saved': {
        const saved = groupsStore.groups.find((candidate) => candidate.id === choice.id);
        const ids = new Set(saved?.nodeIds ?? []);
        return network.nodes.flatMap((node, p) => (ids.has(node.id) ? [p] : []));
      }
    }
  });

  useBenchDetail(
    { workspaceId: subject.workspaceId, runId: run().id },
    matrix,
    network.filtration.order,
    () => view.value.pair,
  );

  const label = (p: number): string => network.labels[p] ?? '';
  const bound = ({ p, q }: Pair): number => (values[q] ?? 0) - (values[p] ?? 0);

  /** A time of the filtration as a reader knows it: the entry as recorded, or the step. */
  function moment(value: number): string {
    if (run().scale === 'rank') return `step ${writeNumber(value)}`;
    return network.nodes[firstPositionAt(values, value)]?.entryRaw ?? writeNumber(value);
  }

  /** Figures of a pair over all chosen dimensions; null until it has landed. */
  function figuresOf(pair: Pair) {
    if (!matrix.isKnown(pair.p, pair.q)) return null;
    const index = pairIndex(n, pair.p, pair.q);
    const distance = matrix.largestDistance(dimensions, index);
    const gap = matrix.largestBettiGap(dimensions, index);
    return {
      index,
      distance,
      gap,
      bound: bound(pair),
      similarity: similarityOf(distance, bound(pair)),
    };
  }

  function describe(pair: Pair): readonly string[] {
    const figures = figuresOf(pair);
    const heading = `${label(pair.p)} ⇄ ${label(pair.q)}`;
    const places = `arrivals ${pair.p + 1} and ${pair.q + 1}`;
    if (figures === null) return [heading, places, 'not computed yet'];
    const change =
      figures.distance === 0
        ? 'swap-safe: no bar moves'
        : `moves the barcode by ${writeNumber(figures.distance)} of at most ${amount(figures.bound)}`;
    const gap = figures.gap === 0 ? '' : ` · Betti gap ${figures.gap}`;
    return [heading, `${change}`, `similarity ${writeShare(figures.similarity)}${gap} · ${places}`];
  }

  const pointers = new Set<(pair: Pair | null) => void>();
  const spoken = ref('');
  const cursor = shallowRef<Pair | null>(null);
  const events: PairEvents = {
    onPoint(pair, keyboard) {
      const same = pair?.p === cursor.value?.p && pair?.q === cursor.value?.q;
      if (!same) {
        cursor.value = pair;
        for (const point of pointers) point(pair);
      }
      if (keyboard) spoken.value = pair === null ? 'Nothing selected.' : describe(pair).join('. ');
    },
    onSelect(pair) {
      change({ pair, ...(pair === null ? {} : { face: 'pair' as const }) });
      if (pair !== null) spoken.value = `Selected. ${describe(pair).join('. ')}`;
    },
  };

  return {
    ...subject,
    n,
    values,
    dimensions,
    amount,
    view,
    change,
    inks,
    field,
    lowerField,
    complete,
    ended,
    safe,
    communities,
    summary,
    order,
    group,
    label,
    bound,
    moment,
    figuresOf,
    describe,
    pointers,
    spoken,
    events,
  };
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
