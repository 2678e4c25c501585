/** A place on the drawing. x grows to the right, y grows downwards, as in SVG. */
export interface Point {
  x: number;
  y: number;
}

const short = (n: number): number => Math.round(n * 100) / 100 || 0;
const xy = (p: Point): string => `${short(p.x)} ${short(p.y)}`;

/** Point at `radius` from the origin; `degrees` from twelve o'clock, clockwise positive. */
export function pointAt(radius: number, degrees: number): Point {
  const t = ((degrees - 90) * Math.PI) / 180;
  return { x: radius * Math.cos(t), y: radius * Math.sin(t) };
}

/**
 * SVG path of an arc round the origin from one angle to another (degrees from twelve o'clock, clockwise positive; a
 * smaller `to` sweeps counter-clockwise). Less than 0.4° gives an empty string; a whole turn or more a closed circle.
 */
export function arcPath(radius: number, from: number, to: number): string {
  const sweep = to - from;
  if (Math.abs(sweep) < 0.4) return '';
  if (Math.abs(sweep) >= 359.9) return circlePath(radius);
  const large = Math.abs(sweep) > 180 ? 1 : 0;
  const clockwise = sweep > 0 ? 1 : 0;
  const r = short(radius);
  return `M${xy(pointAt(radius, from))}A${r} ${r} 0 ${large} ${clockwise} ${xy(pointAt(radius, to))}`;
}

/** SVG path of a closed circle round the origin. */
export function circlePath(radius: number): string {
  const r = short(radius);
  return `M0 ${-r}A${r} ${r} 0 1 1 0 ${r}A${r} ${r} 0 1 1 0 ${-r}Z`;
}

/** SVG path of the ring piece between two radii and two angles (degrees from twelve o'clock). */
export function sectorPath(inner: number, outer: number, from: number, to: number): string {
  const large = Math.abs(to - from) > 180 ? 1 : 0;
  const clockwise = to > from ? 1 : 0;
  const [r0, r1] = [short(inner), short(outer)];
  return (
    `M${xy(pointAt(outer, from))}A${r1} ${r1} 0 ${large} ${clockwise} ${xy(pointAt(outer, to))}` +
    `L${xy(pointAt(inner, to))}A${r0} ${r0} 0 ${large} ${1 - clockwise} ${xy(pointAt(inner, from))}Z`
  );
}

/** SVG path of a hexagon round the origin, corner at `turn` degrees from twelve o'clock. */
export function hexagonPath(radius: number, turn: number): string {
  return `M${[0, 1, 2, 3, 4, 5].map((k) => xy(pointAt(radius, 60 * k + turn))).join('L')}Z`;
}

/** SVG path of a straight line from one radius to another at an angle; `aside` shifts it sideways, in units. */
export function rayPath(degrees: number, inner: number, outer: number, aside = 0): string {
  const t = ((degrees - 90) * Math.PI) / 180;
  const shift = { x: -Math.sin(t) * aside, y: Math.cos(t) * aside };
  const [a, b] = [pointAt(inner, degrees), pointAt(outer, degrees)];
  return `M${xy({ x: a.x + shift.x, y: a.y + shift.y })}L${xy({ x: b.x + shift.x, y: b.y + shift.y })}`;
}

/** SVG path through points in order: the dotted order on the map. Fewer than two points give an empty string. */
export function orderPath(points: readonly Point[]): string {
  return points.length < 2 ? '' : `M${points.map(xy).join('L')}`;
}

/** An arrow: the line's path, where its tip stands and which way it points (degrees, 0 = right, clockwise). */
export interface Arrow {
  path: string;
  tip: Point;
  angle: number;
}

/** What an arrow between two holes keeps clear of. Radii in drawing units. */
export interface ArrowRoom {
  /** Radius kept free round the hole it leaves (ring of the current head). */
  clearFrom: number;
  /** Radius kept free round the hole it points to. */
  clearTo: number;
  /** Radius of the heads in between. */
  head: number;
  /** All other holes. */
  others: readonly Point[];
}

/**
 * The arrow from the current hole to the next: straight where the way is free, bowed where the holes stand too close
 * for a straight one or another head is in the way. Null where both holes are the same place.
 */
export function arrowBetween(from: Point, to: Point, room: ArrowRoom): Arrow | null {
  const length = Math.hypot(to.x - from.x, to.y - from.y);
  if (length < 1) return null;
  const blocked = room.others.some((p) => distanceToSegment(p, from, to) < room.head + 2);
  const free = length - room.clearFrom - room.clearTo;
  return !blocked && free >= 24 ? straightArrow(from, to, length, room) : bowedArrow(from, to, length, room, blocked);
}

function straightArrow(from: Point, to: Point, length: number, room: ArrowRoom): Arrow {
  const u = { x: (to.x - from.x) / length, y: (to.y - from.y) / length };
  const start = { x: from.x + u.x * room.clearFrom, y: from.y + u.y * room.clearFrom };
  const tip = { x: to.x - u.x * room.clearTo, y: to.y - u.y * room.clearTo };
  return { path: `M${xy(start)}L${xy(tip)}`, tip, angle: (Math.atan2(u.y, u.x) * 180) / Math.PI };
}

/** Of the two sides the arrow can bow to: the one free of heads, and of two free ones the one towards the middle. */
function bowedArrow(from: Point, to: Point, length: number, room: ArrowRoom, blocked: boolean): Arrow {
  const heading = (Math.atan2(to.y - from.y, to.x - from.x) * 180) / Math.PI + 90;
  const rise = blocked ? Math.max(room.head * 2.2, length * 0.22) + room.clearFrom * 0.35 : room.head * 0.8;
  const middle = middleOf([from, to, ...room.others]);
  const sides = [1, -1].map((side) => {
    const start = add(from, pointAt(room.clearFrom, heading + side * 52));
    const tip = add(to, pointAt(room.clearTo, heading + 180 - side * 58));
    const control = add({ x: (start.x + tip.x) / 2, y: (start.y + tip.y) / 2 }, pointAt(rise, heading + side * 90));
    const top = { x: (start.x + tip.x + 2 * control.x) / 4, y: (start.y + tip.y + 2 * control.y) / 4 };
    const nearest = Math.min(room.head * 1.3, ...room.others.map((p) => Math.hypot(p.x - top.x, p.y - top.y)));
    return { start, tip, control, worth: nearest - 0.02 * Math.hypot(top.x - middle.x, top.y - middle.y) };
  });
  const best = sides.reduce((a, b) => (b.worth > a.worth ? b : a));
  const angle = (Math.atan2(best.tip.y - best.control.y, best.tip.x - best.control.x) * 180) / Math.PI;
  return { path: `M${xy(best.start)}Q${xy(best.control)} ${xy(best.tip)}`, tip: best.tip, angle };
}

const middleOf = (points: readonly Point[]): Point => ({
  x: points.reduce((sum, p) => sum + p.x, 0) / points.length,
  y: points.reduce((sum, p) => sum + p.y, 0) / points.length,
});
const add = (a: Point, b: Point): Point => ({ x: a.x + b.x, y: a.y + b.y });

/** Distance of a point from the straight piece between two points. */
export function distanceToSegment(p: Point, a: Point, b: Point): number {
  const along = { x: b.x - a.x, y: b.y - a.y };
  const square = along.x * along.x + along.y * along.y;
  const t = square === 0 ? 0 : ((p.x - a.x) * along.x + (p.y - a.y) * along.y) / square;
  const s = Math.max(0, Math.min(1, t));
  return Math.hypot(p.x - a.x - s * along.x, p.y - a.y - s * along.y);
}
