import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { arcPath, arrowBetween, distanceToSegment, orderPath, pointAt } from './paths';

const numbers = (path: string): number[] => (path.match(/-?\d+(\.\d+)?/g) ?? []).map(Number);

describe('pointAt', () => {
  it('counts from twelve o’clock, clockwise, y downwards', () => {
    const close = (degrees: number, x: number, y: number): void => {
      const p = pointAt(10, degrees);
      expect(p.x).toBeCloseTo(x, 9);
      expect(p.y).toBeCloseTo(y, 9);
    };
    close(0, 0, -10);
    close(90, 10, 0);
    close(180, 0, 10);
    close(-90, -10, 0);
  });
});

describe('arcPath', () => {
  it('begins and ends at its angles, sweeping the way asked', () => {
    fc.assert(
      fc.property(fc.integer({ min: -300, max: 300 }), fc.integer({ min: -350, max: 350 }), (from, sweep) => {
        fc.pre(Math.abs(sweep) >= 1);
        const n = numbers(arcPath(50, from, from + sweep));
        const [start, end] = [pointAt(50, from), pointAt(50, from + sweep)];
        expect(n[0]).toBeCloseTo(start.x, 1);
        expect(n[1]).toBeCloseTo(start.y, 1);
        expect(n[5]).toBe(Math.abs(sweep) > 180 ? 1 : 0);
        expect(n[6]).toBe(sweep > 0 ? 1 : 0);
        expect(n[7]).toBeCloseTo(end.x, 1);
        expect(n[8]).toBeCloseTo(end.y, 1);
      }),
    );
  });

  it('is empty for no turn and closed for a whole one', () => {
    expect(arcPath(50, 10, 10.2)).toBe('');
    expect(arcPath(50, 0, 360)).toContain('Z');
  });
});

describe('orderPath', () => {
  it('joins holes in order and is empty for a single one', () => {
    expect(
      orderPath([
        { x: 0, y: 0 },
        { x: 10, y: 0 },
        { x: 10, y: 5 },
      ]),
    ).toBe('M0 0L10 0L10 5');
    expect(orderPath([{ x: 1, y: 1 }])).toBe('');
  });
});

describe('arrowBetween', () => {
  const room = { clearFrom: 54, clearTo: 44, head: 30, others: [] };

  it('is straight where the way is free', () => {
    const arrow = arrowBetween({ x: 0, y: 0 }, { x: 200, y: 0 }, room);
    expect(arrow).toMatchObject({ path: 'M54 0L156 0', tip: { x: 156, y: 0 }, angle: 0 });
  });

  it('bows between close neighbours and past a head that is in the way', () => {
    expect(arrowBetween({ x: 0, y: 0 }, { x: 90, y: 0 }, room)?.path).toContain('Q');
    const blocked = arrowBetween({ x: 0, y: 0 }, { x: 300, y: 0 }, { ...room, others: [{ x: 150, y: 0 }] });
    expect(blocked?.path).toContain('Q');
  });

  it('bows towards the inside of the joint, where that is free', () => {
    const others = [
      { x: 150, y: 0 },
      { x: 0, y: 200 },
      { x: 150, y: 200 },
      { x: 300, y: 200 },
    ];
    const n = numbers(arrowBetween({ x: 0, y: 0 }, { x: 300, y: 0 }, { ...room, others })!.path);
    expect(n[3]).toBeGreaterThan(0);
  });

  it('always keeps its tip clear of the head it points to', () => {
    fc.assert(
      fc.property(fc.integer({ min: -400, max: 400 }), fc.integer({ min: -400, max: 400 }), (x, y) => {
        fc.pre(Math.hypot(x, y) > 60);
        const arrow = arrowBetween({ x: 0, y: 0 }, { x, y }, room)!;
        expect(Math.hypot(arrow.tip.x - x, arrow.tip.y - y)).toBeCloseTo(room.clearTo, 6);
      }),
    );
  });

  it('is not drawn from a hole to itself', () => {
    expect(arrowBetween({ x: 5, y: 5 }, { x: 5, y: 5 }, room)).toBeNull();
  });
});

describe('distanceToSegment', () => {
  it('measures to the nearest end outside the piece', () => {
    expect(distanceToSegment({ x: -3, y: 4 }, { x: 0, y: 0 }, { x: 10, y: 0 })).toBe(5);
    expect(distanceToSegment({ x: 5, y: 2 }, { x: 0, y: 0 }, { x: 10, y: 0 })).toBe(2);
  });
});
