import { WEIGHT_STEPS, type ImportWeights } from '#contract/imports';

/**
 * How many edges each weight keeps when it is the threshold.
 * @param weights f64[m] of the folded edges, NaN for none
 */
export function weightSteps(weights: Float64Array, nodes: number): ImportWeights['weights'] {
  const known = weights.filter((weight) => !Number.isNaN(weight)).sort();
  // Index in `known` of the first edge of each distinct weight.
  const firsts: number[] = [];
  for (let at = 0; at < known.length; at++) {
    if (at === 0 || known[at] !== known[at - 1]) firsts.push(at);
  }
  const complete = firsts.length <= WEIGHT_STEPS;
  const chosen = complete
    ? firsts
    : Array.from({ length: WEIGHT_STEPS }, (_, step) => {
        const at = Math.round((step * (firsts.length - 1)) / (WEIGHT_STEPS - 1));
        return firsts[at] ?? 0;
      });
  return {
    nodes,
    edges: weights.length,
    withoutWeight: weights.length - known.length,
    steps: chosen.map((first) => ({ least: known[first] ?? 0, edges: known.length - first })),
    complete,
  };
}
