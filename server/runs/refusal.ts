import type { RunEstimate } from '#contract/runs';

type Counted = Omit<RunEstimate, 'maxDimension' | 'refusal'>;

const written = (count: number): string => count.toLocaleString('en-GB');
const megabytes = (bytes: number): string => written(Math.ceil(bytes / 2 ** 20));

/** @returns why a run with this estimate is refused, with the number and the ways out; or null. */
export function refusalOf(maxDimension: number, estimate: Counted): string | null {
  const { exact, bytes, cliques, allowed } = estimate;
  if (!exact) {
    return (
      `Up to dimension ${maxDimension} this network has more cliques of up to ` +
      `${cliques.length} nodes than can be handled: counting stopped at the limit of ` +
      `${written(allowed.simplices)}. ${waysOut(maxDimension)}`
    );
  }
  if (bytes > allowed.bytes) {
    return (
      `Up to dimension ${maxDimension} the run needs about ${megabytes(bytes)} MiB of memory; ` +
      `${megabytes(allowed.bytes)} MiB are allowed. ${waysOut(maxDimension)}`
    );
  }
  return null;
}

function waysOut(maxDimension: number): string {
  const weaker = 'bring in a revision without its weaker edges (a higher weight threshold)';
  return maxDimension === 0
    ? `To go on, ${weaker}.`
    : `Choose fewer dimensions (${maxDimension - 1} as the highest), or ${weaker}.`;
}
