import { countCliques, type CliqueCounts } from './cliques';
import { MatrixComputation } from './fast/compute';
import type { Memory } from './fast/budget';
import {
  adoptFoundation,
  foundationData,
  layFoundation,
  recordedBars,
  type Foundation,
  type FoundationData,
} from './fast/foundation';
import { arrivalOrder, orderGraph, validateNetwork, type OrderedGraph } from './graph';
import { EngineLimitError, type Barcode, type Control, type Limits, type Network } from './types';

/** A network made ready for any number of rows: its tables and the reduction of its recorded order. */
export interface Prepared {
  readonly nodeCount: number;
  /** D, 0..3. */
  readonly maxDimension: number;
  /** f by arrival position, ascending. Length n. */
  readonly values: Float64Array;
  readonly counts: CliqueCounts;
  readonly foundation: Foundation;
  /** Most bytes of typed arrays held at once so far. */
  readonly peakBytes: number;
  /** The buffers of the computation of rows; made when first asked for. */
  computation(): MatrixComputation;
  /** Throws the buffers away: after an exception they are in no defined state. */
  forget(): void;
}

/**
 * Validates the network, counts its cliques against the limits, lists them and reduces the recorded
 * order.
 *
 * @param maxDimension D, 0..3: cliques of up to D + 2 nodes take part
 * @param memory `shared` where other threads are to use the tables (see `preparedData`)
 * @throws EngineInputError for a network that is not simple or not finite
 * @throws EngineLimitError past `limits`, with the number that broke it
 * @throws EngineStopped when `control` says so
 */
export function prepare(
  network: Network,
  maxDimension: number,
  limits: Limits,
  control: Control,
  memory: Memory = 'own',
): Prepared {
  validateNetwork(network, maxDimension);
  const graph = orderGraph(network, arrivalOrder(network.values));
  const counts = countCliques(graph, maxDimension + 2, limits.simplices);
  if (!counts.exact) throw tooManySimplices(counts, limits);
  const foundation = layFoundation({
    values: graph.values,
    ends: endsOf(graph),
    maxDimension,
    limits,
    control,
    memory,
  });
  const { nodeCount } = network;
  return overFoundation({ nodeCount, maxDimension, values: graph.values, counts }, foundation);
}

/**
 * A prepared network as plain data: posted to another thread, all that lies in shared memory (see
 * `prepare`) is read there without a copy.
 */
export interface PreparedData {
  readonly subject: PreparedSubject;
  readonly foundation: FoundationData;
}

type PreparedSubject = Pick<Prepared, 'nodeCount' | 'maxDimension' | 'values' | 'counts'>;

export function preparedData(prepared: Prepared): PreparedData {
  const { nodeCount, maxDimension, values, counts, foundation } = prepared;
  const { bySize, containing, latest, total, exact } = counts;
  const plainCounts = { bySize, containing, latest, total, exact };
  return {
    subject: { nodeCount, maxDimension, values, counts: plainCounts },
    foundation: foundationData(foundation),
  };
}

/**
 * The prepared network of another thread, with buffers for its own rows.
 * @throws EngineLimitError if the tables are larger than `limits.bytes`
 */
export function adoptPrepared({ subject, foundation }: PreparedData, limits: Limits): Prepared {
  return overFoundation(subject, adoptFoundation(foundation, limits));
}

function overFoundation(subject: PreparedSubject, foundation: Foundation): Prepared {
  let computation: MatrixComputation | null = null;
  return {
    ...subject,
    foundation,
    get peakBytes() {
      return foundation.tables.budget.peak;
    },
    computation: () => (computation ??= new MatrixComputation(foundation)),
    forget: () => (computation = null),
  };
}

/** The recorded barcode: bars of dimensions 0..D by (birth, death). */
export function recordedBarcode(prepared: Prepared): Barcode {
  return recordedBars(prepared.foundation);
}

/** Two arrival positions per edge, the later one first. */
function endsOf({ nodeCount, starts, earlier }: OrderedGraph): Int32Array {
  const ends = new Int32Array(2 * earlier.length);
  for (let i = 0; i < nodeCount; i++) {
    for (let k = starts[i]!; k < starts[i + 1]!; k++) {
      ends[2 * k] = i;
      ends[2 * k + 1] = earlier[k]!;
    }
  }
  return ends;
}

function tooManySimplices({ bySize, total }: CliqueCounts, limits: Limits): EngineLimitError {
  const largest = bySize.reduce((best, count, s) => (count > bySize[best]! ? s : best), 0);
  return new EngineLimitError(
    'simplices',
    total,
    limits.simplices,
    `The network has more than ${limits.simplices} cliques of up to ${bySize.length} nodes ` +
      `(counted until then: ${bySize[largest]!} with ${largest + 1} nodes). ` +
      'Choose fewer dimensions, or leave weaker edges out.',
  );
}
