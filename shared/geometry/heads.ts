import { arcPath, circlePath, hexagonPath, rayPath, sectorPath } from './paths';
import { headMarks, type HeadFlag, type HeadMarks } from './headMarks';

/** What the fill of a head says about this pass. `none`: no fastener in the hole; `unknown`: cannot tell (W9). */
export type HeadFill =
  'bare' | 'todo' | 'in' | 'over' | 'under' | 'lookAgain' | 'apart' | 'accepted' | 'none' | 'unknown';

/**
 * Everything one head shows, in plain figures. All angles are degrees in the direction of this stage: positive is
 * clockwise, or counter-clockwise where `ccw` is set. No verdict is ever read from the stripe: `fill` and `flag` come
 * from the judgement of the figures.
 */
export interface HeadState {
  fill: HeadFill;
  /** The ink tick(s) on the casting are drawn: one for group A, two for B and so on. */
  hasTick: boolean;
  /** Turn added up since the tick; null before the seating torque (no stripe yet). */
  stripeDeg: number | null;
  /** Turn of this pass; null where this pass has not turned it. Negative where it was loosened. */
  passDeg: number | null;
  /** Turn of earlier passes, added up. */
  earlierDeg: number;
  /** Turn of this pass if the figure on the screen is recorded: drawn dashed. */
  pendingDeg?: number;
  ccw?: boolean;
  /** Window of this pass, measured from where this pass began. */
  pegs?: { lowDeg: number; highDeg: number } | null;
  now: boolean;
  flag?: HeadFlag;
  /** A fact: `new`, `3rd`, `W-04`. */
  tag?: string;
  group: string;
  /** A new fastener that has to catch up: passes done of passes due. */
  behind?: { done: number; total: number };
}

/** How a head is drawn. */
export interface HeadDraw {
  /** Radius of an ordinary head in drawing units (= CSS px where the map is drawn one to one). */
  radius: number;
  /** Label of the hole; only its length matters here. */
  label: string;
  /** Where the tick stands on the casting, degrees from twelve o'clock: 90 per quarter turn of the map. */
  tickDeg?: number;
  /** Read from near (office, overview): heads keep number and hexagon down to figures of 16 px. */
  lean?: boolean;
}

/** Bar of paint on the head, drawn at `angle`; x, y, width, height before turning. */
export interface Stripe {
  angle: number;
  x: number;
  y: number;
  width: number;
  height: number;
  kind: 'paint' | 'dashed' | 'unknown';
}

/** Ready paths and measures round the origin; a component only puts them on the page. */
export interface HeadGeometry {
  /** Radius of the disc, larger at the current head. */
  radius: number;
  small: boolean;
  ring: { radius: number; width: number } | null;
  disc: { shape: 'hollow' | 'filled' | 'half' | 'gone'; tone: HeadFill; width: number };
  halfPath: string;
  crossPath: string;
  hexagon: { path: string; width: number } | null;
  ticks: { path: string; width: number; count: number } | null;
  earlier: { path: string; width: number } | null;
  pass: { path: string; width: number } | null;
  pending: { path: string; width: number } | null;
  /** Closed circles drawn so far, never more than three; `wholeTurns` counts them all. */
  wholeTurns: number;
  pegs: { area: string; rays: string; width: number } | null;
  stripe: Stripe | null;
  label: { size: number; y: number } | null;
  marks: HeadMarks;
}

/** Heads of less than 44 px across lose number and hexagon (look.md, "Sizes"). */
export const SMALL_HEAD = 44;
/** The current head and its ring, as multiples of an ordinary head's radius. */
export const NOW_DISC = 1.27;
export const NOW_RING = 1.79;
const MOST_LANES = 3;
const LEAN_RADIUS = 17.6;

/** Whether a head of this radius is drawn in its small form; `lean` where the drawing is read from near. */
export const isSmallHead = (radius: number, lean = false): boolean => radius < (lean ? LEAN_RADIUS : SMALL_HEAD / 2);

/** What all parts of one head are measured from. */
interface Frame {
  radius: number;
  /** Scale: 1 at a radius of 36. */
  k: number;
  small: boolean;
  tick: number;
  angle: (turn: number) => number;
}

function frameOf(state: HeadState, draw: HeadDraw): Frame {
  const small = isSmallHead(draw.radius, draw.lean);
  const radius = state.now ? draw.radius * (small ? 1.1 : NOW_DISC) : draw.radius;
  const tick = draw.tickDeg ?? 0;
  const hand = state.ccw ? -1 : 1;
  return { radius, k: radius / 36, small, tick, angle: (turn) => tick + hand * turn };
}

/** Geometry of one head from its state. Pure; same input, same paths. */
export function headGeometry(state: HeadState, draw: HeadDraw): HeadGeometry {
  const frame = frameOf(state, draw);
  const { radius, k, small } = frame;
  const gone = state.fill === 'none';
  return {
    radius,
    small,
    ring: state.now ? { radius: draw.radius * NOW_RING, width: Math.max(3.5, Math.min(5, 5.5 * k)) } : null,
    disc: { shape: discShape(state.fill), tone: state.fill, width: Math.max(2.4, 3 * k) },
    halfPath: `M0 ${-radius}A${radius} ${radius} 0 0 0 0 ${radius}Z`,
    crossPath: crossPath(radius * 0.5),
    hexagon:
      small || gone
        ? null
        : { path: hexagonPath(radius * 0.83, stripeAngle(state, frame.angle)), width: Math.max(1.2, 1.7 * k) },
    ticks: state.hasTick ? tickMarks(state.group, frame) : null,
    ...turnArcs(state, frame),
    wholeTurns: Math.floor((Math.abs(state.earlierDeg + (state.passDeg ?? 0)) + 1e-9) / 360),
    pegs: state.pegs && !gone ? pegMarks(state.earlierDeg, state.pegs, frame) : null,
    stripe: gone ? null : stripeBar(state, frame),
    label: small || gone ? null : labelMeasure(draw.label, radius, state.now),
    marks: headMarks(state, radius, small),
  };
}

function discShape(fill: HeadFill): HeadGeometry['disc']['shape'] {
  if (fill === 'none') return 'gone';
  if (fill === 'unknown') return 'half';
  return fill === 'bare' || fill === 'todo' ? 'hollow' : 'filled';
}

function turnArcs(state: HeadState, frame: Frame): Pick<HeadGeometry, 'earlier' | 'pass' | 'pending'> {
  const begun = state.earlierDeg;
  const turned = state.passDeg ?? 0;
  const thick = Math.max(2.2, 3.4 * frame.k);
  const arc = (from: number, to: number, width: number): { path: string; width: number } | null => {
    const path = laneArcs(from, to, frame);
    return path ? { path, width } : null;
  };
  return {
    earlier: arc(0, begun, Math.max(1.6, 2 * frame.k)),
    pass: arc(begun, begun + turned, thick),
    pending: state.pendingDeg === undefined ? null : arc(begun + turned, begun + state.pendingDeg, thick),
  };
}

/**
 * Each whole turn has a lane of its own further out, so that a closed circle stands for a whole turn and the rest of
 * the turn stays to be read on the next lane.
 */
function laneArcs(from: number, to: number, { radius, k, angle }: Frame): string {
  const lane = (i: number): number => radius + 7 * Math.min(1.6, k) + i * 5 * k;
  const [low, high] = from <= to ? [from, to] : [to, from];
  if (low < 0) return arcPath(lane(0), angle(Math.max(low, -359.5)), angle(high));
  let path = '';
  for (let i = Math.floor(low / 360); i * 360 < high && i < MOST_LANES; i++) {
    const a = Math.max(low, i * 360);
    const b = Math.min(high, (i + 1) * 360);
    path += b - a >= 359.9 ? circlePath(lane(i)) : arcPath(lane(i), angle(a), angle(b));
  }
  return path;
}

const stripeAngle = (state: HeadState, angle: (turn: number) => number): number =>
  angle(state.pendingDeg === undefined ? (state.stripeDeg ?? 0) : state.earlierDeg + state.pendingDeg);

/** Straight bar, 0.4 R long, across the rim. */
function stripeBar(state: HeadState, { radius, k, angle }: Frame): Stripe | null {
  if (state.stripeDeg === null && state.pendingDeg === undefined) return null;
  const width = Math.max(5, 8.5 * k);
  const outer = radius + 2.5 * k;
  const height = Math.max(outer - radius * 0.65, 8);
  const kind = state.fill === 'unknown' ? 'unknown' : state.pendingDeg === undefined ? 'paint' : 'dashed';
  return { angle: stripeAngle(state, angle), x: -width / 2, y: -outer, width, height, kind };
}

function pegMarks(
  begun: number,
  pegs: { lowDeg: number; highDeg: number },
  { radius, k, angle }: Frame,
): NonNullable<HeadGeometry['pegs']> {
  const [low, high] = [angle(begun + pegs.lowDeg), angle(begun + pegs.highDeg)];
  const [inner, outer] = [radius + 2 * k, radius + 14 * k];
  return {
    area: sectorPath(inner, outer, low, high),
    rays: rayPath(low, inner, outer) + rayPath(high, inner, outer),
    width: Math.max(3, 3.2 * k),
  };
}

/** Ticks of a group: A one, B two, C three; from D on four, the letter tells them apart. */
export const tickCount = (group: string): number => Math.max(1, Math.min(4, group.charCodeAt(0) - 64 || 1));

function tickMarks(group: string, { radius, k, small, tick }: Frame): NonNullable<HeadGeometry['ticks']> {
  const count = tickCount(group);
  const width = small ? Math.max(1.8, 4.4 * k) : Math.max(3, 4 * k) * (count > 2 ? 0.8 : 1);
  const gap = width * (count > 2 ? 1.9 : 2.2);
  const [inner, outer] = small ? [radius + 3, radius + 9] : [radius + 2.5 * k, radius + 15 * k];
  let path = '';
  for (let i = 0; i < count; i++) path += rayPath(tick, inner, outer, (i - (count - 1) / 2) * gap);
  return { path, width, count };
}

const crossPath = (r: number): string => `M${-r} ${-r}L${r} ${r}M${r} ${-r}L${-r} ${r}`;

/** Figures as large as the head allows: 27 px from R = 30, 44 px at the current head; long labels shrink to fit. */
function labelMeasure(label: string, radius: number, now: boolean): { size: number; y: number } {
  const wanted = now ? 1.16 * radius : 0.91 * radius;
  const size = Math.min(wanted, (1.56 * radius) / Math.max(1, label.length * 0.55));
  return { size, y: size * 0.335 };
}
