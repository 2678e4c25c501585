import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { headGeometry, tickCount, type HeadState } from './heads';

const aHead = (more: Partial<HeadState> = {}): HeadState => ({
  fill: 'todo',
  hasTick: true,
  stripeDeg: 0,
  passDeg: null,
  earlierDeg: 0,
  now: false,
  group: 'A',
  ...more,
});
const draw = { radius: 33, label: '7' };
const circles = (path: string | undefined): number => (path?.match(/Z/g) ?? []).length;

describe('the stripe', () => {
  it('stands at the turn added up since the tick, whichever pass it came from', () => {
    const g = headGeometry(aHead({ stripeDeg: 181, earlierDeg: 91, passDeg: 90 }), draw);
    expect(g.stripe?.angle).toBe(181);
  });

  it('turns the other way counter-clockwise', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 720, noNaN: true }), (turn) => {
        const right = headGeometry(aHead({ stripeDeg: turn, passDeg: turn }), draw).stripe!.angle;
        const left = headGeometry(aHead({ stripeDeg: turn, passDeg: turn, ccw: true }), draw).stripe!.angle;
        expect(left + right).toBeCloseTo(0, 9);
      }),
    );
  });

  it('is 0.4 of the radius long (look.md, "paint-marked bolts")', () => {
    for (const radius of [24, 30, 33, 40]) {
      const g = headGeometry(aHead(), { ...draw, radius });
      expect(g.stripe!.height / radius).toBeGreaterThan(0.37);
      expect(g.stripe!.height / radius).toBeLessThan(0.43);
    }
  });

  it('is not there before the seating torque, nor in an empty hole', () => {
    expect(headGeometry(aHead({ fill: 'bare', stripeDeg: null }), draw).stripe).toBeNull();
    expect(headGeometry(aHead({ fill: 'none', stripeDeg: 90 }), draw).stripe).toBeNull();
  });

  it('is dashed where the figure is not saved, and stands where saving would put it', () => {
    const g = headGeometry(aHead({ earlierDeg: 90, stripeDeg: 90, pendingDeg: 91, now: true }), draw);
    expect(g.stripe).toMatchObject({ kind: 'dashed', angle: 181 });
    expect(g.pending?.path).toContain('A');
  });

  it('goes back when loosened: 60° of 180° leaves it at 120°', () => {
    const g = headGeometry(aHead({ stripeDeg: 120, earlierDeg: 180, passDeg: -60 }), draw);
    const [x = 0, y = 0] = (g.pass?.path.match(/-?[\d.]+/g) ?? []).map(Number);
    expect(g.stripe?.angle).toBe(120);
    expect((Math.atan2(x, -y) * 180) / Math.PI).toBeCloseTo(120, 0);
  });

  it('turns with the casting when the map is turned', () => {
    expect(headGeometry(aHead({ stripeDeg: 90, passDeg: 90 }), { ...draw, tickDeg: 90 }).stripe?.angle).toBe(180);
  });
});

describe('whole turns', () => {
  it.each([
    [0, 0],
    [359, 0],
    [360, 1],
    [400, 1],
    [720, 2],
    [725, 2],
  ])('%s° closes %s circles', (turn, closed) => {
    const g = headGeometry(aHead({ fill: 'in', stripeDeg: turn, passDeg: turn }), draw);
    expect(g.wholeTurns).toBe(closed);
    expect(circles(g.pass?.path)).toBe(closed);
  });

  it('are counted over passes: 270° and then 180° is one turn and a quarter', () => {
    const g = headGeometry(aHead({ fill: 'in', stripeDeg: 450, earlierDeg: 270, passDeg: 180 }), draw);
    expect(g.wholeTurns).toBe(1);
    expect(g.stripe?.angle).toBe(450);
  });

  it('never draw more than three lanes, however far it was turned', () => {
    const g = headGeometry(aHead({ stripeDeg: 3000, passDeg: 3000 }), draw);
    expect(circles(g.pass?.path)).toBe(3);
    expect(g.wholeTurns).toBe(8);
  });
});

describe('the fill', () => {
  it.each([
    ['bare', 'hollow'],
    ['todo', 'hollow'],
    ['in', 'filled'],
    ['over', 'filled'],
    ['accepted', 'filled'],
    ['unknown', 'half'],
    ['none', 'gone'],
  ] as const)('%s is drawn %s', (fill, shape) => {
    expect(headGeometry(aHead({ fill }), draw).disc.shape).toBe(shape);
  });
});

describe('pegs', () => {
  it('are measured from where this pass began', () => {
    const pegs = { lowDeg: 85, highDeg: 95 };
    const first = headGeometry(aHead({ now: true, pegs }), { ...draw, tickDeg: 90 });
    const second = headGeometry(aHead({ now: true, pegs, earlierDeg: 90, stripeDeg: 90 }), draw);
    expect(second.pegs?.area).toBe(first.pegs?.area);
  });

  it('stay inside the ring of the current head', () => {
    const g = headGeometry(aHead({ now: true, pegs: { lowDeg: 85, highDeg: 95 } }), draw);
    const reach = g.radius + (14 * g.radius) / 36;
    expect(reach).toBeLessThan(g.ring!.radius);
  });
});

describe('sizes', () => {
  it('drop number and hexagon under 44 px, keep fill, stripe and tick', () => {
    const small = headGeometry(aHead(), { radius: 21.9, label: '7' });
    expect(small).toMatchObject({ small: true, label: null, hexagon: null });
    expect(small.stripe).not.toBeNull();
    expect(small.ticks).not.toBeNull();
    expect(headGeometry(aHead(), { radius: 22, label: '7' }).small).toBe(false);
  });

  it('give figures of 27 px at R = 30 and of 44 px at the current head', () => {
    expect(headGeometry(aHead(), { radius: 30, label: '14' }).label!.size).toBeGreaterThanOrEqual(27);
    expect(headGeometry(aHead({ now: true }), { radius: 30, label: '14' }).label!.size).toBeGreaterThanOrEqual(44);
  });

  it('keep long labels inside the head', () => {
    const g = headGeometry(aHead(), { radius: 30, label: '1234' });
    expect(g.label!.size * 4 * 0.55).toBeLessThanOrEqual(2 * g.radius * 0.83);
  });
});

describe('slots', () => {
  it('hang over above and under below, on the east side; the tag stays south-west', () => {
    const over = headGeometry(aHead({ flag: { kind: 'over', text: '+9°' }, tag: 'new' }), draw).marks;
    const under = headGeometry(aHead({ flag: { kind: 'under', text: '−6°' } }), draw).marks;
    expect(over.flag!.y).toBeLessThan(0);
    expect(under.flag!.y).toBeGreaterThan(0);
    expect(Math.min(over.flag!.x, under.flag!.x)).toBeGreaterThan(0);
    expect(over.tag!.x).toBeLessThan(0);
    expect(over.tag!.y).toBeGreaterThan(0);
  });

  it('outline the pennant of what a supervisor accepted', () => {
    const flag = { kind: 'over', text: '+9°' } as const;
    expect(headGeometry(aHead({ fill: 'accepted', flag }), draw).marks.flag?.outlined).toBe(true);
    expect(headGeometry(aHead({ fill: 'over', flag }), draw).marks.flag?.outlined).toBe(false);
  });

  it('count passes of a fastener that catches up', () => {
    const { tally } = headGeometry(aHead({ behind: { done: 1, total: 4 } }), draw).marks;
    expect(tally.map((t) => t.done)).toEqual([true, false, false, false]);
  });

  it('mark groups by the number of ticks', () => {
    expect(['A', 'B', 'C', 'D', 'H'].map(tickCount)).toEqual([1, 2, 3, 4, 4]);
  });
});
