import { mad, mean, median } from './spread';

/**
 * How far each value stands from its group, M = 0.6745·(x − median)/MAD (J6, REF-SPC-21). Where more than half are equal
 * and MAD is 0, the mean absolute deviation from the median, times 1.253314, takes its place (REF-SPC-23). Null where that
 * is 0 too: all are equal. Throws on no values.
 */
export function modifiedZ(values: readonly number[]): number[] | null {
  const centre = median(values);
  const deviations = values.map((value) => value - centre);
  const spread = mad(values);
  if (spread > 0) return deviations.map((deviation) => (0.6745 * deviation) / spread);
  const fallback = 1.253314 * mean(deviations.map(Math.abs));
  return fallback > 0 ? deviations.map((deviation) => deviation / fallback) : null;
}
