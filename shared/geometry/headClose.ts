import { tickCount, type HeadState, type Stripe } from './heads';
import { arcPath, hexagonPath, pointAt, rayPath, sectorPath, type Point } from './paths';

/** Pennant or diamond beside the large head. */
export interface CloseFlag extends Point {
  kind: NonNullable<HeadState['flag']>['kind'];
  path: string;
  text: string;
  textY: number;
  outlined: boolean;
}

/** Paths of the one large head, in a box of 484 × 436 units round the origin; `x` moves the head aside of its pegs. */
export interface CloseGeometry {
  radius: number;
  x: number;
  gone: boolean;
  ticks: string;
  earlier: string;
  pass: string;
  pegs: { area: string; rays: string; low: Point; high: Point } | null;
  /** Turned beyond the window, filled. */
  beyond: string;
  /** Still missing to the window, dashed. */
  missing: string;
  hexagon: string;
  cross: string;
  stripe: Omit<Stripe, 'kind'> | null;
  label: { size: number };
  started: Point | null;
  flag: CloseFlag | null;
}

const R = 142;

/** Geometry of the close view (sketch of the deviation). Angles as in `HeadState`. */
export function closeGeometry(state: HeadState, label: string): CloseGeometry {
  const hand = state.ccw ? -1 : 1;
  const angle = (turn: number): number => hand * turn;
  const begun = state.earlierDeg;
  const end = begun + (state.passDeg ?? 0);
  const pegs = state.pegs ?? null;
  const turn = angle(state.stripeDeg ?? 0);
  const upTo = pegs ? Math.min(end, begun + pegs.lowDeg) : end;
  return {
    radius: R,
    x: -40 * hand,
    gone: state.fill === 'none',
    ticks: ticksOf(state.group),
    earlier: begun > 0 ? arcPath(R + 16, 0, angle(Math.min(begun, 359.5))) : '',
    pass: state.passDeg === null ? '' : arcPath(R + 16, angle(begun), angle(upTo)),
    pegs: pegs ? pegsOf(begun, pegs, angle) : null,
    beyond:
      pegs && end > begun + pegs.highDeg ? sectorPath(R + 8, R + 40, angle(begun + pegs.highDeg), angle(end)) : '',
    missing:
      pegs && state.passDeg !== null && end < begun + pegs.lowDeg
        ? arcPath(R + 16, angle(end), angle(begun + pegs.lowDeg))
        : '',
    hexagon: hexagonPath(R * 0.8, turn),
    cross: `M${-R / 2} ${-R / 2}L${R / 2} ${R / 2}M${R / 2} ${-R / 2}L${-R / 2} ${R / 2}`,
    stripe:
      state.stripeDeg === null || state.fill === 'none'
        ? null
        : { angle: turn, x: -15, y: -R - 32, width: 30, height: R * 0.38 + 32 },
    label: { size: Math.min(104, (R * 1.5) / Math.max(1, label.length * 0.55)) },
    started: state.hasTick && state.stripeDeg !== null ? STARTED : null,
    flag: state.flag ? flagOf(state.flag, state.fill === 'accepted') : null,
  };
}

/** Always on the west side of the tick: the east belongs to the flag. */
const STARTED: Point = { x: -18, y: -R - 28 };

function ticksOf(group: string): string {
  const count = tickCount(group);
  return Array.from({ length: count }, (_, i) => rayPath(0, R + 8, R + 52, (i - (count - 1) / 2) * 17)).join('');
}

function pegsOf(
  begun: number,
  pegs: { lowDeg: number; highDeg: number },
  angle: (turn: number) => number,
): NonNullable<CloseGeometry['pegs']> {
  const [low, high] = [angle(begun + pegs.lowDeg), angle(begun + pegs.highDeg)];
  const spread = Math.max(0, 14 - (pegs.highDeg - pegs.lowDeg) / 2);
  const apart = Math.sign(high - low) * spread;
  return {
    area: sectorPath(R + 8, R + 56, low, high),
    rays: rayPath(low, R + 8, R + 60) + rayPath(high, R + 8, R + 60),
    low: pointAt(R + 62 + spread, low - apart),
    high: pointAt(R + 62 + spread, high + apart),
  };
}

function flagOf(flag: NonNullable<HeadState['flag']>, outlined: boolean): CloseFlag {
  const diamond = flag.kind === 'lookAgain' || flag.kind === 'apart';
  const half = Math.max(46, flag.text.length * 11 + 14);
  const place = { x: 226 - (diamond ? 40 : half), y: flag.kind === 'under' ? 160 : -164 };
  if (diamond) {
    return {
      ...place,
      kind: flag.kind,
      path: 'M0 -38L38 0L0 38L-38 0Z',
      text: flag.kind === 'lookAgain' ? '?' : '',
      textY: 12,
      outlined,
    };
  }
  const path =
    flag.kind === 'over' ? `M${-half} 22V-16L0 -34L${half} -16V22Z` : `M${-half} -22V16L0 34L${half} 16V-22Z`;
  return { ...place, kind: flag.kind, path, text: flag.text, textY: flag.kind === 'over' ? 13 : 11, outlined };
}
