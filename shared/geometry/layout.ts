import { isSmallHead, NOW_RING } from './heads';
import type { Point } from './paths';

/** One hole on the map, millimetres, seen facing the heads. */
export interface MapHole extends Point {
  id: string;
  label: string;
  group: string;
}

/** Words beside the four edges of the map. */
export interface MapSideWords {
  top?: string;
  right?: string;
  bottom?: string;
  left?: string;
}

/** The map of a joint as its author drew it (A1). Millimetres; y grows downwards. */
export interface MapSpec {
  holes: MapHole[];
  outline?: 'rectangle' | 'round';
  /** Cylinders, journals, anything faint that helps to find one's place. */
  bores?: { x: number; y: number; r: number; label: string }[];
  sides: MapSideWords;
}

/** Space for the drawing, in drawing units (CSS px where drawn one to one), and how it is turned. */
export interface MapBox {
  width: number;
  height: number;
  /** Quarter turns clockwise, to match where one stands (A1). */
  quarterTurns?: number;
  /** Read from near: numbers stay on smaller heads. */
  lean?: boolean;
}

/** A hole with its place on the drawing. */
export interface PlacedHole extends Point {
  hole: MapHole;
}

/** A side's words, upright, one word a line where it stands left or right. */
export interface PlacedSide extends Point {
  side: keyof MapSideWords;
  lines: string[];
  anchor: 'start' | 'middle' | 'end';
}

/** Casting behind the heads. */
export type PlacedOutline =
  | { kind: 'rectangle'; x: number; y: number; width: number; height: number; corner: number }
  | { kind: 'round'; x: number; y: number; radius: number; inner: number };

/** The map laid out for one box. */
export interface MapLayout {
  width: number;
  height: number;
  /** Radius of an ordinary head: no two heads overlap, nor a neighbour and the ring of the current head. */
  radius: number;
  ringRadius: number;
  /** Radius of the invisible touch twin: at least 24, so that nothing is under 48 px across. */
  touchRadius: number;
  /** Heads are under 44 px across: no numbers on them, a lens is wanted. */
  small: boolean;
  /** Where the ticks stand after turning, degrees from twelve o'clock. */
  tickDeg: number;
  holes: PlacedHole[];
  bores: { x: number; y: number; r: number; label: string }[];
  outline: PlacedOutline;
  sides: PlacedSide[];
}

const MOST_RADIUS = 40;
const LEAST_RADIUS = 5;
/** Head radius as a share of the distance to the nearest neighbour: leaves room for arcs, ticks and the ring. */
const HEAD_SHARE = 0.34;
const SIDE_FONT = 18;
/** One axis may be drawn tighter than the other so that labels stay readable; never for round castings. */
const SQUEEZES = [1, 1.15, 1 / 1.15, 1.3, 1 / 1.3, 1.45, 1 / 1.45, 1.6, 1 / 1.6];

/** Number of quarter turns as 0 to 3; any whole number is taken. */
export const quarterTurnsOf = (turns: number): 0 | 1 | 2 | 3 => ((((turns % 4) + 4) % 4) | 0) as 0 | 1 | 2 | 3;

/** A point after clockwise quarter turns round the origin: a rotation, never a mirror image. */
export function turnPoint(p: Point, turns: number): Point {
  const q = quarterTurnsOf(turns);
  if (q === 1) return { x: -p.y || 0, y: p.x };
  if (q === 2) return { x: -p.x || 0, y: -p.y || 0 };
  if (q === 3) return { x: p.y, y: -p.x || 0 };
  return { x: p.x, y: p.y };
}

/** Side words after clockwise quarter turns: what stood at the top stands on the right after one. */
export function turnSides(sides: MapSideWords, turns: number): MapSideWords {
  const names = ['top', 'right', 'bottom', 'left'] as const;
  const q = quarterTurnsOf(turns);
  const turned: MapSideWords = {};
  names.forEach((name, i) => {
    const words = sides[name];
    if (words) turned[names[(i + q) % 4] ?? 'top'] = words;
  });
  return turned;
}

interface Frame {
  spec: MapSpec;
  box: MapBox;
  holes: Point[];
  bores: { x: number; y: number; r: number; label: string }[];
  sides: MapSideWords;
  margins: { top: number; right: number; bottom: number; left: number };
}

interface Fit {
  sx: number;
  sy: number;
  radius: number;
  squeeze: number;
}

interface Extent {
  left: number;
  top: number;
  right: number;
  bottom: number;
}

/** Lays the map out: holes in millimetres to drawing units, heads as large as they can be without overlapping. */
export function layoutMap(spec: MapSpec, box: MapBox): MapLayout {
  const frame = frameOf(spec, box);
  const fit = bestFit(frame);
  const extent = extentOf(frame, fit);
  const { margins } = frame;
  const room = { x: box.width - margins.left - margins.right, y: box.height - margins.top - margins.bottom };
  const shift = {
    x: margins.left + (room.x - (extent.right - extent.left)) / 2 - extent.left,
    y: margins.top + (room.y - (extent.bottom - extent.top)) / 2 - extent.top,
  };
  const place = (p: Point): Point => ({ x: p.x * fit.sx + shift.x, y: p.y * fit.sy + shift.y });
  const edge: Extent = {
    left: extent.left + shift.x,
    right: extent.right + shift.x,
    top: extent.top + shift.y,
    bottom: extent.bottom + shift.y,
  };
  const holes = spec.holes.map((hole, i) => ({ hole, ...place(frame.holes[i] ?? { x: 0, y: 0 }) }));
  return {
    width: box.width,
    height: box.height,
    radius: fit.radius,
    ringRadius: fit.radius * NOW_RING,
    touchRadius: Math.max(24, fit.radius + 8),
    small: isSmallHead(fit.radius, box.lean),
    tickDeg: quarterTurnsOf(box.quarterTurns ?? 0) * 90,
    holes,
    bores: frame.bores.map((b) => ({ ...b, ...place(b), r: b.r * Math.min(fit.sx, fit.sy) })),
    outline: outlineOf(spec, edge, holes, fit.radius),
    sides: placeSides(frame.sides, edge),
  };
}

function frameOf(spec: MapSpec, box: MapBox): Frame {
  const turns = box.quarterTurns ?? 0;
  const sides = turnSides(spec.sides, turns);
  return {
    spec,
    box,
    holes: spec.holes.map((h) => turnPoint(h, turns)),
    bores: (spec.bores ?? []).map((b) => ({ ...b, ...turnPoint(b, turns) })),
    sides,
    margins: {
      top: sides.top ? 30 : 4,
      bottom: sides.bottom ? 30 : 4,
      left: sides.left ? wordRoom(sides.left) : 4,
      right: sides.right ? wordRoom(sides.right) : 4,
    },
  };
}

const sideLines = (words: string): string[] => words.split(/\s+/).filter(Boolean);
/** Width kept for upright words beside the casting: an estimate of 0.53 em a letter. */
const wordRoom = (words: string): number =>
  Math.max(...sideLines(words).map((w) => w.length), 1) * SIDE_FONT * 0.53 + 12;

/** The largest heads that fit; a squeeze is taken only for a gain of 4 %. */
function bestFit(frame: Frame): Fit {
  const ratios = frame.spec.outline === 'round' ? [1] : SQUEEZES;
  let best: Fit | null = null;
  for (const squeeze of ratios) {
    const fit = fitWith(frame, squeeze);
    if (!best || fit.radius > best.radius * 1.04) best = fit;
  }
  return best ?? { sx: 1, sy: 1, radius: LEAST_RADIUS, squeeze: 1 };
}

function fitWith(frame: Frame, squeeze: number): Fit {
  const ax = squeeze < 1 ? squeeze : 1;
  const ay = squeeze > 1 ? 1 / squeeze : 1;
  const nearest = nearestDistance(frame.holes, ax, ay);
  const at = (s: number): Fit => ({
    sx: s * ax,
    sy: s * ay,
    radius: Math.max(LEAST_RADIUS, Math.min(MOST_RADIUS, nearest * s * HEAD_SHARE)),
    squeeze,
  });
  const width = frame.box.width - frame.margins.left - frame.margins.right;
  const height = frame.box.height - frame.margins.top - frame.margins.bottom;
  const fits = (s: number): boolean => {
    const e = extentOf(frame, at(s));
    return e.right - e.left <= width && e.bottom - e.top <= height;
  };
  let [low, high] = [0, 1];
  while (fits(high) && high < 64) [low, high] = [high, high * 2];
  for (let i = 0; i < 40; i++) {
    const middle = (low + high) / 2;
    if (fits(middle)) low = middle;
    else high = middle;
  }
  return at(low);
}

/** Distance between the two nearest holes under a squeeze; infinite for a single hole. */
function nearestDistance(holes: readonly Point[], ax: number, ay: number): number {
  let least = Infinity;
  holes.forEach((a, i) => {
    for (const b of holes.slice(i + 1)) least = Math.min(least, Math.hypot((a.x - b.x) * ax, (a.y - b.y) * ay));
  });
  return least;
}

/** What the casting takes up, before it is moved into its place. */
function extentOf(frame: Frame, fit: Fit): Extent {
  const pad = fit.radius * NOW_RING + 5;
  const discs = [
    ...frame.holes.map((p) => ({ x: p.x * fit.sx, y: p.y * fit.sy, r: pad })),
    ...frame.bores.map((b) => ({ x: b.x * fit.sx, y: b.y * fit.sy, r: b.r * Math.min(fit.sx, fit.sy) + 10 })),
  ];
  if (frame.spec.outline === 'round') return roundExtent(discs);
  return {
    left: Math.min(...discs.map((d) => d.x - d.r), Infinity),
    top: Math.min(...discs.map((d) => d.y - d.r), Infinity),
    right: Math.max(...discs.map((d) => d.x + d.r), -Infinity),
    bottom: Math.max(...discs.map((d) => d.y + d.r), -Infinity),
  };
}

function roundExtent(discs: readonly { x: number; y: number; r: number }[]): Extent {
  const middle = middleOf(discs);
  const r = Math.max(...discs.map((d) => Math.hypot(d.x - middle.x, d.y - middle.y) + d.r), 0);
  return { left: middle.x - r, right: middle.x + r, top: middle.y - r, bottom: middle.y + r };
}

const middleOf = (points: readonly Point[]): Point => {
  const xs = points.map((p) => p.x);
  const ys = points.map((p) => p.y);
  return { x: (Math.min(...xs) + Math.max(...xs)) / 2, y: (Math.min(...ys) + Math.max(...ys)) / 2 };
};

function outlineOf(spec: MapSpec, e: Extent, holes: readonly PlacedHole[], radius: number): PlacedOutline {
  if (spec.outline !== 'round') {
    return { kind: 'rectangle', x: e.left, y: e.top, width: e.right - e.left, height: e.bottom - e.top, corner: 22 };
  }
  const middle = { x: (e.left + e.right) / 2, y: (e.top + e.bottom) / 2 };
  const innermost = Math.min(...holes.map((h) => Math.hypot(h.x - middle.x, h.y - middle.y)));
  const inner = innermost - radius * NOW_RING - 6;
  return { kind: 'round', ...middle, radius: (e.right - e.left) / 2, inner: inner > 60 ? inner : 0 };
}

function placeSides(sides: MapSideWords, e: Extent): PlacedSide[] {
  const middle = { x: (e.left + e.right) / 2, y: (e.top + e.bottom) / 2 };
  const placed: PlacedSide[] = [];
  if (sides.top) placed.push({ side: 'top', lines: [sides.top], x: middle.x, y: e.top - 10, anchor: 'middle' });
  if (sides.bottom)
    placed.push({ side: 'bottom', lines: [sides.bottom], x: middle.x, y: e.bottom + 23, anchor: 'middle' });
  if (sides.left)
    placed.push({ side: 'left', lines: sideLines(sides.left), x: e.left - 8, y: middle.y, anchor: 'end' });
  if (sides.right)
    placed.push({ side: 'right', lines: sideLines(sides.right), x: e.right + 8, y: middle.y, anchor: 'start' });
  return placed;
}
