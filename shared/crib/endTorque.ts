import { compareQuantities, type Quantity } from '../quantity/quantity';

const ENOUGH_READINGS = 20;

/** The high side of the torque to expect at the end of a turn, and where it comes from. */
export interface EndTorquePrediction {
  high: Quantity;
  from: 'readings' | 'estimate';
}

/**
 * How high the end torque may go (K2): the 95th percentile (nearest rank: the smallest reading that 95 % do not pass) of
 * at least 20 readings of earlier walks, else the upper band of the estimate; null where there is neither.
 */
export function predictEndTorque(
  readings: readonly Quantity[],
  estimateHigh: Quantity | null,
): EndTorquePrediction | null {
  if (readings.length >= ENOUGH_READINGS) {
    const rising = [...readings].sort(compareQuantities);
    const high = rising[Math.ceil((rising.length * 95) / 100) - 1];
    if (high) return { high, from: 'readings' };
  }
  return estimateHigh ? { high: estimateHigh, from: 'estimate' } : null;
}
