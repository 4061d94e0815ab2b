import { computed, type ComputedRef } from 'vue';
import { measureField, type Measure, type MeasureField } from '../graphs/measures';
import { orderingOf } from '../graphs/ordering';
import { runSummary } from '../graphs/runSummary';
import { safePairs } from '../graphs/swapSafeGraph';
import type { SwapMatrix } from '../graphs/swapMatrix';
import { useBenchRunStore } from '../stores/benchRun';
import { useBenchCommunities } from './benchCommunities';
import type { BenchNetwork } from './benchNetwork';
import type { BenchView } from './benchQuery';

export interface FieldsInput {
  readonly matrix: SwapMatrix;
  readonly network: BenchNetwork;
  /** The chosen dimensions of the run. */
  readonly dimensions: readonly number[];
  readonly view: ComputedRef<BenchView>;
  readonly ended: ComputedRef<boolean>;
}

/** What is computed from the matrix: measures, safe pairs, communities, orders, summary. */
export function useBenchFields({ matrix, network, dimensions, view, ended }: FieldsInput) {
  const store = useBenchRunStore();
  const { values } = network.filtration;
  /** A value that is computed again when pairs land. */
  const live = <T>(compute: () => T): ComputedRef<T> =>
    computed(() => {
      void store.landed;
      return compute();
    });

  // Read one by one, so that a new selection computes no measure and no order again.
  const dimension = computed(() => view.value.dimension);
  const measure = computed(() => view.value.measure);
  const lower = computed(() => view.value.lower);
  const ordering = computed(() => view.value.order);

  const shown = computed(() =>
    dimension.value !== null && dimensions.includes(dimension.value)
      ? [dimension.value]
      : dimensions,
  );
  const fieldOf = (name: ComputedRef<Measure>): ComputedRef<MeasureField> =>
    live(() =>
      measureField(matrix, values, name.value, name.value === 'moves' ? dimensions : shown.value),
    );

  const complete = live(() => matrix.knownCount >= matrix.coveredCount);
  const safe = live(() => safePairs(matrix, dimensions));
  const communities = useBenchCommunities(() =>
    ended.value || complete.value ? { nodeCount: matrix.nodeCount, safe: safe.value } : null,
  );
  const order = live(() =>
    orderingOf(ordering.value, {
      matrix,
      dimensions,
      labels: network.labels,
      communities: communities.value?.communities ?? [],
    }),
  );
  return {
    field: fieldOf(measure),
    lowerField: fieldOf(lower),
    complete,
    safe,
    communities,
    order,
    summary: live(() => runSummary(matrix, values, dimensions)),
  };
}
