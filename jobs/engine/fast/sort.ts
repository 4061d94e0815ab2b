/** Longest list that is sorted by insertion; beyond it the built-in sort is faster. */
const INSERTION = 40;

/** Sorts values[0..count-1] ascending. */
export function sortNumbers(values: Float64Array | Int32Array, count: number): void {
  if (count > INSERTION) {
    values.subarray(0, count).sort();
    return;
  }
  for (let i = 1; i < count; i++) {
    const v = values[i]!;
    let j = i - 1;
    for (; j >= 0 && values[j]! > v; j--) values[j + 1] = values[j]!;
    values[j + 1] = v;
  }
}

/** Index of the first of values[0..count-1] (ascending) that is at least `bound`. */
export function lowerBound(
  values: Float64Array | Int32Array,
  count: number,
  bound: number,
): number {
  let low = 0;
  let high = count;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (values[middle]! < bound) low = middle + 1;
    else high = middle;
  }
  return low;
}
