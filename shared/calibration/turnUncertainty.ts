/** One turn made up of pulls by the same wrench; accuracy and resolution in degrees. */
export interface TurnUncertaintyInput {
  pulls: number;
  accuracyDeg: number;
  resolutionDeg: number;
}

/**
 * Standard uncertainty of a turn in degrees (J3): u² = (n·a/√3)² + n·r²/12. The pulls' errors add straight, because the
 * same wrench errs the same way each time.
 */
export function turnUncertainty({ pulls, accuracyDeg, resolutionDeg }: TurnUncertaintyInput): number {
  const fromAccuracy = (pulls * accuracyDeg) / Math.sqrt(3);
  return Math.sqrt(fromAccuracy * fromAccuracy + (pulls * resolutionDeg * resolutionDeg) / 12);
}

/** True when n·a passes half of the half-window: so many pulls with this wrench say little about the turn (J3). */
export function tooManyPulls(pulls: number, accuracyDeg: number, lowDeg: number, highDeg: number): boolean {
  return pulls * accuracyDeg > (highDeg - lowDeg) / 4;
}
