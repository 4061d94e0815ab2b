import type { RunEstimate } from '#contract/runs';

type Counted = Omit<RunEstimate, 'maxDimension' | 'part' | 'refusal'>;

const written = (count: number): string => count.toLocaleString('en-GB');
const megabytes = (bytes: number): string => written(Math.ceil(bytes / 2 ** 20));
const span = (seconds: number): string =>
  seconds < 3600
    ? `${seconds.toLocaleString('en-GB', { maximumSignificantDigits: 3 })} s`
    : `${(seconds / 3600).toLocaleString('en-GB', { maximumSignificantDigits: 3 })} h`;

/** @returns why a run with this estimate is refused, with the number and the ways out; or null. */
export function refusalOf(maxDimension: number, estimate: Counted): string | null {
  const { exact, bytes, seconds, cliques, allowed } = estimate;
  if (!exact) {
    return (
      `Up to dimension ${maxDimension} this network has more cliques of up to ` +
      `${cliques.length} nodes than can be handled: counting stopped at the limit of ` +
      `${written(allowed.simplices)}. Fewer pairs have the same cliques. ${waysOut(estimate)}`
    );
  }
  if (bytes > allowed.bytes) {
    return (
      `Up to dimension ${maxDimension} the run needs about ${megabytes(bytes)} MiB of memory; ` +
      `${megabytes(allowed.bytes)} MiB are allowed. Fewer pairs need the same memory. ` +
      waysOut(estimate)
    );
  }
  if (seconds > allowed.seconds) {
    return (
      `Up to dimension ${maxDimension} these ${written(estimate.pairs)} pairs would take about ` +
      `${span(seconds)} of one thread; ${span(allowed.seconds)} are allowed. ${waysOut(estimate)}`
    );
  }
  return null;
}

/** Only what would fit is named; a higher threshold is a new network, which is counted anew. */
function waysOut({ ways }: Counted): string {
  const named: string[] = [];
  if (ways !== null) {
    const { dimension, within, overlapping } = ways;
    if (dimension !== null) named.push(`choose fewer dimensions (${dimension} as the highest)`);
    if (within !== null) {
      named.push(`choose pairs within k positions (up to ${written(within)} fit)`);
    }
    if (overlapping !== null) {
      named.push(
        `choose only pairs whose intervals overlap (${written(overlapping.pairs)} pairs, ` +
          `about ${span(overlapping.seconds)})`,
      );
    }
  }
  named.push('bring in a revision without its weaker edges (a higher weight threshold)');
  const list =
    named.length === 1 ? named[0] : `${named.slice(0, -1).join(', ')}, or ${named.at(-1)}`;
  return `To go on, ${list}.`;
}
