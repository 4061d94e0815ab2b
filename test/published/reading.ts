/** Short ways to ask the engine, for the published checks. */
import { computeRows, prepare, recordedBarcode } from '../../jobs/engine/index';
import type { Barcode, Bars, Control, Limits, Network } from '../../jobs/engine/types';

const QUIET: Control = { shouldStop: () => false, onProgress: () => undefined };
const AMPLE: Limits = { simplices: 20_000_000, bytes: 2 ** 31 };

export function preparedOf(network: Network, maxDimension = 3) {
  return prepare(network, maxDimension, AMPLE, QUIET);
}

export function barcodeOf(network: Network, maxDimension = 3): Barcode {
  return recordedBarcode(preparedOf(network, maxDimension));
}

/** (b0, b1, b2, b3) of the whole complex. */
export function bettiNumbers(network: Network): number[] {
  return barcodeOf(network).map(
    ({ deaths }) => deaths.filter((death) => death === Infinity).length,
  );
}

/** Bars as pairs, for literal comparison. */
export function pairsOf({ births, deaths }: Bars): [number, number][] {
  return Array.from(births, (birth, k) => [birth, deaths[k]!]);
}

export function barsOf(pairs: readonly (readonly [number, number])[]): Bars {
  return {
    births: Float64Array.from(pairs, ([birth]) => birth),
    deaths: Float64Array.from(pairs, ([, death]) => death),
  };
}

/** A barcode as text: equal exactly if the barcodes are equal. */
export function spelled(barcode: Barcode): string {
  return barcode
    .map((bars) =>
      pairsOf(bars)
        .map(([b, d]) => `[${b},${d})`)
        .join(''),
    )
    .join(' | ');
}

/** All swaps: distances[k] of the pairs (p, q) in order. */
export function wholeMatrix(network: Network, maxDimension = 3) {
  const rows = Uint32Array.from({ length: network.nodeCount }, (_, p) => p);
  const { distances, pairCount } = computeRows(preparedOf(network, maxDimension), rows, QUIET);
  return Array.from({ length: pairCount }, (_, i) =>
    Array.from({ length: maxDimension + 1 }, (__, k) => distances[k * pairCount + i]!),
  );
}
