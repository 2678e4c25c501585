import { normalCdf } from '../statistics/normalCdf';

/** A corrected value, its limits and its standard uncertainty, all in one unit. */
export interface ConformanceInput {
  value: number;
  low: number;
  high: number;
  uncertainty: number;
}

/**
 * The probability that the true value lies within its limits (J4, JCGM 106:2012 clause 7):
 * Φ((hi − x)/u) − Φ((lo − x)/u). For review and annex only: it decides nothing and is not stored. Null without an
 * uncertainty, so that a value of unknown quality is never called sure.
 */
export function conformanceProbability({ value, low, high, uncertainty }: ConformanceInput): number | null {
  if (!(uncertainty > 0)) return null;
  // In the upper half both terms are near 1 and would cancel: mirrored, they are small.
  const [near, far] = value > (low + high) / 2 ? [value - high, value - low] : [low - value, high - value];
  return normalCdf(far / uncertainty) - normalCdf(near / uncertainty);
}
