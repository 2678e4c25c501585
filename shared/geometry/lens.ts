import type { MapLayout, PlacedHole, PlacedSide } from './layout';
import { NOW_RING } from './heads';
import type { Point } from './paths';

/** A magnified view of the current hole and its neighbours, for maps whose heads are too small to read. */
export interface Lens extends Point {
  width: number;
  height: number;
  radius: number;
  /** Places inside the lens, measured from its top left corner. */
  holes: PlacedHole[];
}

const RADIUS = 30;
const CAPTION = 34;
const EDGE = 4;

/** Sizes tried in turn, until one finds a free place. */
const SIZES = [
  { width: 320, height: 256 },
  { width: 220, height: 256 },
  { width: 320, height: 164 },
];

/** Lens for the hole `nowId`: magnified true to direction, set where it covers no head. Null where none is wanted. */
export function lensOf(layout: MapLayout, nowId: string | null): Lens | null {
  const now = layout.holes.find((h) => h.hole.id === nowId);
  if (!layout.small || !now) return null;
  for (const { width, height } of SIZES) {
    const place = lensPlace(layout, width, height);
    if (place) return { width, height, radius: RADIUS, holes: magnified(layout, now, width, height), ...place };
  }
  return null;
}

/** Nearest neighbours, as many as fit without touching each other or the edge. */
function magnified(layout: MapLayout, now: PlacedHole, width: number, height: number): PlacedHole[] {
  const others = layout.holes
    .filter((h) => h !== now)
    .map((h) => ({ h, d: Math.hypot(h.x - now.x, h.y - now.y) }))
    .sort((a, b) => a.d - b.d);
  const nearest = others[0]?.d ?? 1;
  const scale = (RADIUS * (NOW_RING + 1.45) + 4) / nearest;
  const inside = others
    .slice(0, 6)
    .map(({ h }) => ({ hole: h.hole, x: (h.x - now.x) * scale, y: (h.y - now.y) * scale }));
  for (let count = inside.length; count >= 0; count--) {
    const chosen = [{ hole: now.hole, x: 0, y: 0 }, ...inside.slice(0, count)];
    const box = spread(chosen);
    if (box.width <= width && box.height <= height - CAPTION) {
      const dx = (width - box.width) / 2 - box.left;
      const dy = (height - CAPTION - box.height) / 2 - box.top;
      return chosen.map((c) => ({ hole: c.hole, x: c.x + dx, y: c.y + dy }));
    }
  }
  return [{ hole: now.hole, x: width / 2, y: (height - CAPTION) / 2 }];
}

/** Room the chosen heads take up: the ring of the current one, arcs beside and ticks above the others. */
function spread(holes: readonly PlacedHole[]): { left: number; top: number; width: number; height: number } {
  const beside = (i: number): number => RADIUS * (i === 0 ? NOW_RING : 1.2) + 6;
  const above = (i: number): number => RADIUS * (i === 0 ? NOW_RING : 1.45) + 8;
  const left = Math.min(...holes.map((h, i) => h.x - beside(i)));
  const right = Math.max(...holes.map((h, i) => h.x + beside(i)));
  const top = Math.min(...holes.map((h, i) => h.y - above(i)));
  const bottom = Math.max(...holes.map((h, i) => h.y + beside(i)));
  return { left, top, width: right - left, height: bottom - top };
}

/** The free place nearest to the middle of the drawing, tried on a grid of 5 units. */
function lensPlace(layout: MapLayout, width: number, height: number): Point | null {
  const clear = layout.radius + 9;
  const middle = { x: (layout.width - width) / 2, y: (layout.height - height) / 2 };
  let best: (Point & { d: number }) | null = null;
  for (let x = EDGE; x <= layout.width - width - EDGE; x += 5) {
    for (let y = EDGE; y <= layout.height - height - EDGE; y += 5) {
      const d = Math.hypot(x - middle.x, y - middle.y);
      if ((!best || d < best.d) && !covers(layout, x, y, width, height, clear)) best = { x, y, d };
    }
  }
  return best && { x: best.x, y: best.y };
}

/** Whether a lens at x, y would lie on a head or on the words of a side. */
function covers(layout: MapLayout, x: number, y: number, width: number, height: number, clear: number): boolean {
  const gap = (p: Point): number =>
    Math.hypot(Math.max(x - p.x, 0, p.x - x - width), Math.max(y - p.y, 0, p.y - y - height));
  return layout.holes.some((h) => gap(h) < clear) || layout.sides.some((s) => gap(wordsMiddle(s)) < 40);
}

const wordsMiddle = (s: PlacedSide): Point => ({ x: s.x + { start: 28, middle: 0, end: -28 }[s.anchor], y: s.y });
