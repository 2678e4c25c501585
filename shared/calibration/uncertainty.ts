/** What is known of a wrench at one torque: its points' interpolation, or only its class. Torques in one unit throughout. */
export interface TorqueUncertaintyInput {
  torque: number;
  /** Half-width of the class, ± percent. */
  classLimitPercent: number;
  /** Smallest step the wrench shows, in the unit of `torque`; 0 where none. */
  resolution: number;
  /** Size of the last digit typed, in the unit of `torque`. */
  lastDigit: number;
  /** From {@link import('./calibrationPoints').calibratedAt}; absent where only the class is known. */
  point?: { expandedPercent: number; holdsResolution: boolean };
  /** Largest as-left to as-found change known, percent; absent until one is. */
  driftPercent?: number;
}

/**
 * Standard uncertainty of a torque reading (J2), in the unit of `torque`:
 * u² = (W/2·T/100)² + (d·T/(100·√3))² + r²/12. With only a class ±a %: W = 0, d = a. With points: W the expanded relative
 * uncertainty (k = 2), d the known drift or half the class. r is the coarser of resolution and last digit, left out where
 * W holds it already. Uses only + − × ÷ √, so every engine agrees to the last bit (J5).
 */
export function torqueUncertainty(input: TorqueUncertaintyInput): number {
  const { torque, point } = input;
  const expanded = point?.expandedPercent ?? 0;
  const drift = point ? (input.driftPercent ?? input.classLimitPercent / 2) : input.classLimitPercent;
  const step = point?.holdsResolution ? 0 : Math.max(input.resolution, input.lastDigit);
  const fromCalibration = ((expanded / 2) * torque) / 100;
  const fromDrift = (drift * torque) / (100 * Math.sqrt(3));
  return Math.sqrt(fromCalibration * fromCalibration + fromDrift * fromDrift + (step * step) / 12);
}

/** The size of the last digit of a decimal: `"30.0"` gives 0.1, `"30"` gives 1. */
export function lastDigitOf(value: string): number {
  const point = value.indexOf('.');
  return Number(`1e-${point < 0 ? 0 : value.length - point - 1}`);
}
