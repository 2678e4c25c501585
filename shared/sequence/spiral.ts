import { align, cluster, type AlignedHole, type HolePosition } from './layout';

/** How far apart (mm) two holes may be and still count as level. */
export const LEVEL_WITHIN_MM = 10;

const distance = (a: AlignedHole, b: AlignedHole): number => Math.hypot(a.along - b.along, a.across - b.across);

/** Takes the holes of one end one by one, each the nearest to the one before; without one before, the topmost. */
function nearestFirst(holes: readonly AlignedHole[], before: AlignedHole | undefined): AlignedHole[] {
  const left = [...holes].sort((a, b) => a.across - b.across || a.along - b.along);
  const order: AlignedHole[] = [];
  let last = before;
  while (left.length > 0) {
    const from = last;
    const next = from
      ? left.reduce((best, hole) => (distance(hole, from) < distance(best, from) - 1e-9 ? hole : best))
      : left[0];
    if (!next) break;
    left.splice(left.indexOf(next), 1);
    order.push(next);
    last = next;
  }
  return order;
}

/**
 * The centre-out spiral of a rectangular head (A1, REF-SEQ-33): from the middle outward, ring by ring, in each ring one
 * end and then the other, starting with the side where the last bolt was. Two rows of seven give the middle pair, then
 * left pair, right pair, next left pair … A permutation of the holes' ids. Holes within `levelWithin` mm count as level.
 */
export function spiral(holes: readonly HolePosition[], levelWithin = LEVEL_WITHIN_MM): string[] {
  if (holes.length === 0) return [];
  const order: AlignedHole[] = [];
  for (const ring of cluster(align(holes), (hole) => Math.abs(hole.along), levelWithin)) {
    const middle = ring.filter((hole) => Math.abs(hole.along) <= levelWithin / 2);
    const ends = ring.filter((hole) => !middle.includes(hole));
    for (const end of [middle, ends.filter((hole) => hole.along < 0), ends.filter((hole) => hole.along > 0)]) {
      order.push(...nearestFirst(end, order.at(-1)));
    }
  }
  return order.map((hole) => hole.id);
}
