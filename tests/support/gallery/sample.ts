import type { HeadState } from '@shared/geometry/heads';
import type { MapSpec } from '@shared/geometry/layout';

/** Places of the invented inline-six head: column, row (0 = intake side), by label. */
const PLACES: [number, number][] = [
  [3, 0],
  [3, 1],
  [2, 1],
  [2, 0],
  [4, 0],
  [4, 1],
  [1, 1],
  [1, 0],
  [5, 0],
  [5, 1],
  [0, 1],
  [0, 0],
  [6, 0],
  [6, 1],
];
const PITCH = 104;
const ACROSS = 200;

/** An invented inline-six head of fourteen bolts. */
export const headSpec: MapSpec = {
  holes: PLACES.map(([c, r], i) => ({
    id: `h${i + 1}`,
    label: String(i + 1),
    x: c * PITCH,
    y: r * ACROSS,
    group: 'A',
  })),
  bores: [0, 1, 2, 3, 4, 5].map((i) => ({ x: PITCH * (i + 0.5), y: ACROSS / 2, r: 45, label: `cyl ${i + 1}` })),
  sides: { top: 'intake side', bottom: 'exhaust side', left: 'front' },
};
export const headOrder = headSpec.holes.map((h) => h.id);

/** A plain head; anything else is laid over it. */
export const aHead = (more: Partial<HeadState> = {}): HeadState => ({
  fill: 'todo',
  hasTick: true,
  stripeDeg: 0,
  passDeg: null,
  earlierDeg: 0,
  now: false,
  group: 'A',
  ...more,
});

/** Heads of a turn pass: the first `turns.length` are done. */
export function headsAfter(turns: number[], over: Record<string, Partial<HeadState>> = {}): Record<string, HeadState> {
  return Object.fromEntries(
    headOrder.map((id, i) => {
      const turn = turns[i];
      const base = turn === undefined ? aHead() : aHead({ fill: 'in', stripeDeg: turn, passDeg: turn });
      return [id, { ...base, ...over[id] }];
    }),
  );
}

const STAR = [
  0, 16, 8, 24, 4, 20, 12, 28, 2, 18, 10, 26, 6, 22, 14, 30, 1, 17, 9, 25, 5, 21, 13, 29, 3, 19, 11, 27, 7, 23, 15, 31,
];

/** An invented flange of sixty-four bolts in two rings. */
export const flangeSpec: MapSpec = {
  outline: 'round',
  sides: {},
  holes: Array.from({ length: 64 }, (_, i) => {
    const outer = i >= 32;
    const a = (((STAR[i % 32] ?? 0) * 11.25 + (outer ? 5.625 : 0)) * Math.PI) / 180;
    const r = outer ? 286 : 244;
    return { id: `h${i + 1}`, label: String(i + 1), x: r * Math.sin(a), y: -r * Math.cos(a), group: outer ? 'B' : 'A' };
  }),
};
