/** Numbers of a measurement and how they are written. */

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((x, y) => x - y);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}

/** Seconds with as many digits as they deserve. */
export function seconds(value: number): string {
  const digits = value < 0.1 ? 3 : value < 10 ? 2 : value < 100 ? 1 : 0;
  return `${value.toLocaleString('en', { minimumFractionDigits: digits, maximumFractionDigits: digits })} s`;
}

export function megabytes(bytes: number): string {
  return `${(bytes / 1e6).toFixed(0)} MB`;
}

/** A ratio with two significant digits at least. */
export function times(value: number): string {
  const digits = value < 10 ? 2 : value < 100 ? 1 : 0;
  return `${value.toLocaleString('en', { minimumFractionDigits: digits, maximumFractionDigits: digits })}×`;
}

/** Median, and in brackets the smallest and the largest. */
export function spread(values: readonly number[], write: (value: number) => string): string {
  if (values.length === 1) return write(values[0]!);
  return `${write(median(values))} (${write(Math.min(...values))}–${write(Math.max(...values))})`;
}

/** The exponent e of the least-squares line through (log size, log time): time grows like size^e. */
export function growthExponent(points: readonly { size: number; time: number }[]): number {
  const xs = points.map(({ size }) => Math.log(size));
  const ys = points.map(({ time }) => Math.log(time));
  const mean = (list: readonly number[]) => list.reduce((sum, one) => sum + one, 0) / list.length;
  const [mx, my] = [mean(xs), mean(ys)];
  let [above, below] = [0, 0];
  xs.forEach((x, i) => {
    above += (x - mx) * (ys[i]! - my);
    below += (x - mx) ** 2;
  });
  return above / below;
}
