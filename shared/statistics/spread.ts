function demandValues(values: readonly number[], least: number): void {
  if (values.length < least) throw new Error(`Needs at least ${least} values, got ${values.length}`);
}

/** The arithmetic mean. Throws on no values. */
export function mean(values: readonly number[]): number {
  demandValues(values, 1);
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

/** The sample standard deviation, divided by n − 1. Throws on fewer than two values. */
export function stddev(values: readonly number[]): number {
  demandValues(values, 2);
  const centre = mean(values);
  const squares = values.reduce((sum, value) => sum + (value - centre) * (value - centre), 0);
  return Math.sqrt(squares / (values.length - 1));
}

/** The middle value, or the mean of the two in the middle. Throws on no values. */
export function median(values: readonly number[]): number {
  demandValues(values, 1);
  const rising = [...values].sort((a, b) => a - b);
  const middle = Math.floor(rising.length / 2);
  const upper = rising[middle] ?? Number.NaN;
  return rising.length % 2 === 1 ? upper : ((rising[middle - 1] ?? Number.NaN) + upper) / 2;
}

/** The median absolute deviation from the median, not scaled. Throws on no values. */
export function mad(values: readonly number[]): number {
  const centre = median(values);
  return median(values.map((value) => Math.abs(value - centre)));
}
