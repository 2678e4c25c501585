/** One torque of a calibration in one direction: as-left deviation and expanded uncertainty (k = 2), both in percent. */
export interface CalibrationPoint {
  torque: number;
  direction: 'cw' | 'ccw';
  deviationPercent: number;
  expandedPercent: number;
  holdsResolution: boolean;
}

/** What the points say at a torque between two of them. */
export interface CalibratedAt {
  biasPercent: number;
  expandedPercent: number;
  holdsResolution: boolean;
}

/**
 * Bias and uncertainty at a torque (J2): the deviation interpolated between the two bracketing points of that direction,
 * the larger of their uncertainties; resolution counts as held only where both hold it. Null outside the points: there
 * nothing is judged. All torques in one unit.
 */
export function calibratedAt(
  torque: number,
  direction: 'cw' | 'ccw',
  points: readonly CalibrationPoint[],
): CalibratedAt | null {
  const own = points.filter((point) => point.direction === direction).sort((a, b) => a.torque - b.torque);
  const above = own.find((point) => point.torque >= torque);
  const below = own.findLast((point) => point.torque <= torque);
  if (!above || !below) return null;
  const span = above.torque - below.torque;
  const share = span === 0 ? 0 : (torque - below.torque) / span;
  return {
    biasPercent: below.deviationPercent + share * (above.deviationPercent - below.deviationPercent),
    expandedPercent: Math.max(below.expandedPercent, above.expandedPercent),
    holdsResolution: below.holdsResolution && above.holdsResolution,
  };
}
