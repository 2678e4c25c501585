import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { layoutMap, quarterTurnsOf, turnPoint, turnSides, type MapHole, type MapSpec } from './layout';
import type { Point } from './paths';

const hole = (i: number, x: number, y: number): MapHole => ({ id: `h${i}`, label: String(i), x, y, group: 'A' });

/** Holes at least 12 mm apart, as on real joints. */
const joints = fc
  .uniqueArray(fc.tuple(fc.integer({ min: 0, max: 40 }), fc.integer({ min: 0, max: 24 })), {
    minLength: 1,
    maxLength: 40,
    selector: ([x, y]) => `${x},${y}`,
  })
  .map((places): MapSpec => ({ holes: places.map(([x, y], i) => hole(i, x * 12, y * 12)), sides: { left: 'front' } }));
const boxes = fc.record({ width: fc.integer({ min: 300, max: 1400 }), height: fc.integer({ min: 200, max: 900 }) });
const turns = fc.integer({ min: -4, max: 7 });

const pairs = <T>(items: readonly T[]): [T, T][] =>
  items.flatMap((a, i) => items.slice(i + 1).map((b): [T, T] => [a, b]));
const cross = (a: Point, b: Point, c: Point): number => (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x);

describe('layoutMap', () => {
  it('keeps heads apart, and a neighbour clear of the ring of the current head', () => {
    fc.assert(
      fc.property(
        joints,
        boxes,
        turns,
        fc.constantFrom<'rectangle' | 'round'>('rectangle', 'round'),
        (spec, box, quarterTurns, outline) => {
          const layout = layoutMap({ ...spec, outline }, { ...box, quarterTurns });
          if (layout.radius <= 5) return;
          for (const [a, b] of pairs(layout.holes)) {
            const distance = Math.hypot(a.x - b.x, a.y - b.y);
            expect(distance).toBeGreaterThanOrEqual(2 * layout.radius);
            expect(distance).toBeGreaterThanOrEqual(layout.ringRadius + layout.radius);
          }
        },
      ),
    );
  });

  it('keeps everything inside the box', () => {
    fc.assert(
      fc.property(joints, boxes, turns, (spec, box, quarterTurns) => {
        const layout = layoutMap(spec, { ...box, quarterTurns });
        if (layout.radius <= 5) return;
        for (const p of layout.holes) {
          expect(p.x - layout.ringRadius).toBeGreaterThanOrEqual(0);
          expect(p.x + layout.ringRadius).toBeLessThanOrEqual(box.width);
          expect(p.y - layout.ringRadius).toBeGreaterThanOrEqual(0);
          expect(p.y + layout.ringRadius).toBeLessThanOrEqual(box.height);
        }
      }),
    );
  });

  it('is never mirrored: three holes keep their sense of turning in every quarter', () => {
    fc.assert(
      fc.property(joints, boxes, turns, (spec, box, quarterTurns) => {
        const layout = layoutMap(spec, { ...box, quarterTurns });
        const [a, b, c] = spec.holes;
        const [d, e, f] = layout.holes;
        if (!a || !b || !c || !d || !e || !f) return;
        expect(Math.sign(Math.round(cross(d, e, f) * 1e4))).toBe(Math.sign(cross(a, b, c)));
      }),
    );
  });

  it('makes nothing touchable smaller than 48 px', () => {
    fc.assert(
      fc.property(joints, boxes, (spec, box) => {
        expect(layoutMap(spec, box).touchRadius * 2).toBeGreaterThanOrEqual(48);
      }),
    );
  });

  it('draws a round casting round: millimetres weigh the same in both directions', () => {
    const ring = Array.from({ length: 8 }, (_, i) =>
      hole(i, 100 * Math.cos((i * Math.PI) / 4), 100 * Math.sin((i * Math.PI) / 4)),
    );
    const layout = layoutMap({ holes: ring, sides: {}, outline: 'round' }, { width: 900, height: 500 });
    const { outline } = layout;
    if (outline.kind !== 'round') throw new Error('a round casting was asked for');
    const reach = layout.holes.map((h) => Math.hypot(h.x - outline.x, h.y - outline.y));
    expect(Math.max(...reach) - Math.min(...reach)).toBeLessThan(0.01);
  });

  it('lays out a single hole and two holes in one place without failing', () => {
    expect(layoutMap({ holes: [hole(1, 0, 0)], sides: {} }, { width: 700, height: 500 }).radius).toBe(40);
    const twins = layoutMap({ holes: [hole(1, 5, 5), hole(2, 5, 5)], sides: {} }, { width: 700, height: 500 });
    expect(twins.radius).toBeGreaterThan(0);
  });

  it('gives the fourteen-bolt head of the stand numbers of 27 px in the tablet’s map', () => {
    const holes = Array.from({ length: 14 }, (_, i) => hole(i, (i % 7) * 104, Math.floor(i / 7) * 200));
    const layout = layoutMap({ holes, sides: { top: 'a', bottom: 'b', left: 'front' } }, { width: 712, height: 580 });
    expect(layout.radius * 0.91).toBeGreaterThanOrEqual(27);
    expect(layout.small).toBe(false);
  });
});

describe('turning', () => {
  it('comes back after four quarters and is one rotation, whichever way it is counted', () => {
    fc.assert(
      fc.property(fc.integer(), fc.integer(), turns, (x, y, q) => {
        const p = { x, y };
        const once = turnPoint(p, q);
        expect(turnPoint(once, 4 - quarterTurnsOf(q))).toEqual({ x: x || 0, y: y || 0 });
        expect(Math.hypot(once.x, once.y)).toBeCloseTo(Math.hypot(x, y), 6);
      }),
    );
  });

  it('carries the sides along: front at the left is front at the top after one quarter', () => {
    expect(turnSides({ left: 'front', top: 'intake' }, 1)).toEqual({ top: 'front', right: 'intake' });
    expect(turnPoint({ x: -10, y: 0 }, 1)).toEqual({ x: 0, y: -10 });
  });
});
