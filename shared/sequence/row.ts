import { align, cluster, type HolePosition } from './layout';
import { LEVEL_WITHIN_MM } from './spiral';

/**
 * One row after the other along the joint's longer side, each from the same end (A1). A permutation of the holes' ids.
 * Holes within `levelWithin` mm count as one row.
 */
export function row(holes: readonly HolePosition[], levelWithin = LEVEL_WITHIN_MM): string[] {
  if (holes.length === 0) return [];
  return cluster(align(holes), (hole) => hole.across, levelWithin)
    .flatMap((line) => [...line].sort((a, b) => a.along - b.along))
    .map((hole) => hole.id);
}
