/** A hole on the map: its id and its place in millimetres, seen facing the heads, x to the right, y downwards (A1). */
export interface HolePosition {
  id: string;
  x: number;
  y: number;
}

/** A hole in the joint's own directions: `along` its longer side, `across` its shorter, from the middle of its extent. */
export interface AlignedHole {
  id: string;
  along: number;
  across: number;
}

const extent = (values: readonly number[]): { middle: number; size: number } => {
  const [low, high] = [Math.min(...values), Math.max(...values)];
  return { middle: (low + high) / 2, size: high - low };
};

/** Turns the map so that its longer side comes first; equal sides count as lying across the page. */
export function align(holes: readonly HolePosition[]): AlignedHole[] {
  const x = extent(holes.map((hole) => hole.x));
  const y = extent(holes.map((hole) => hole.y));
  const upright = y.size > x.size;
  return holes.map(({ id, x: hx, y: hy }) =>
    upright ? { id, along: hy - y.middle, across: hx - x.middle } : { id, along: hx - x.middle, across: hy - y.middle },
  );
}

/**
 * Groups holes whose `measure` differs by no more than `tolerance` from the group's first, in rising order: rows and
 * rings of a map drawn by hand are never quite straight.
 */
export function cluster<H>(holes: readonly H[], measure: (hole: H) => number, tolerance: number): H[][] {
  const groups: H[][] = [];
  for (const hole of [...holes].sort((a, b) => measure(a) - measure(b))) {
    const last = groups.at(-1);
    const first = last?.[0];
    if (last && first !== undefined && measure(hole) - measure(first) <= tolerance) last.push(hole);
    else groups.push([hole]);
  }
  return groups;
}
